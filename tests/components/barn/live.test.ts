import { describe, expect, it } from 'vitest';
import { followBarn, type LiveState, type Stream } from '@/components/barn/live';

/** A browser's event source and clock that do what the test says. */
const openMeans = () => {
  const streams: {
    path: string;
    closed: boolean;
    readyState: number;
    fire: (name: string, data?: unknown) => void;
  }[] = [];
  let timers: { at: number; run: () => void }[] = [];
  let now = 0;
  return {
    streams,
    pass: (ms: number) => {
      const until = now + ms;
      for (;;) {
        const next = timers.filter(({ at }) => at <= until).sort((a, b) => a.at - b.at)[0];
        if (next === undefined) break;
        timers = timers.filter((timer) => timer !== next);
        now = next.at;
        next.run();
      }
      now = until;
    },
    waiting: () => timers.length,
    means: {
      open: (path: string): Stream => {
        const listeners = new Map<string, (event: { data?: string }) => void>();
        const stream = {
          path,
          closed: false,
          readyState: 0,
          fire: (name: string, data?: unknown) =>
            listeners.get(name)?.(data === undefined ? {} : { data: JSON.stringify(data) }),
          addEventListener: (name: string, listen: (event: { data?: string }) => void) =>
            void listeners.set(name, listen),
          close: () => {
            stream.closed = true;
          },
        };
        streams.push(stream);
        return stream;
      },
      after: (ms: number, run: () => void) => {
        const timer = { at: now + ms, run };
        timers.push(timer);
        return () => {
          timers = timers.filter((one) => one !== timer);
        };
      },
    },
  };
};

const series = '0197f000-0000-7000-8000-000000000001';
const inspection = '0197f000-0000-7000-8000-000000000002';
const news = { kind: 'inspection', series, inspection, state: 'open', version: 2 };

const follow = () => {
  const world = openMeans();
  const heard: unknown[] = [];
  const states: LiveState[] = [];
  let refreshed = 0;
  const stop = followBarn(
    series,
    {
      onNews: (one) => heard.push(one),
      onRefresh: () => {
        refreshed += 1;
      },
      onState: (state) => states.push(state),
    },
    world.means,
  );
  return { ...world, heard, states, stop, refreshed: () => refreshed };
};

const last = <T>(list: readonly T[]): T => {
  const one = list.at(-1);
  if (one === undefined) throw new Error('There is none.');
  return one;
};

describe('following the barn', () => {
  it('hears news, reads anew when told to, and not when nothing was missed', () => {
    const one = follow();
    expect(last(one.streams).path).toBe(`/api/barn/${series}/live`);
    last(one.streams).fire('same', {});
    expect(one.refreshed()).toBe(0);
    last(one.streams).fire('news', news);
    last(one.streams).fire('news', { kind: 'something-later' });
    last(one.streams).fire('refresh', {});
    expect(one.heard).toEqual([news]);
    expect(one.refreshed()).toBe(1);
    expect(one.states).toEqual(['live']);
  });

  it('asks every ten seconds while the stream is refused, and is live again once it opens', () => {
    const one = follow();
    last(one.streams).readyState = 2;
    last(one.streams).fire('error');
    expect(one.states).toEqual(['asking']);
    one.pass(29_000);
    expect(one.refreshed()).toBe(2);
    expect(one.streams).toHaveLength(1);
    one.pass(1_500);
    expect(one.streams).toHaveLength(2);
    last(one.streams).fire('refresh', {});
    const asked = one.refreshed();
    last(one.streams).fire('beat', {});
    one.pass(15_000);
    last(one.streams).fire('beat', {});
    one.pass(15_000);
    expect(one.refreshed()).toBe(asked);
    expect(one.states).toEqual(['asking', 'live']);
  });

  it('gives up a stream that has fallen silent, and opens another', () => {
    const one = follow();
    last(one.streams).fire('refresh', {});
    one.pass(39_000);
    expect(one.states).toEqual(['live']);
    one.pass(2_000);
    expect(last(one.streams).closed).toBe(true);
    expect(one.states).toEqual(['live', 'asking']);
    one.pass(30_000);
    expect(one.streams).toHaveLength(2);
  });

  it('asks while an interrupted stream comes back by itself', () => {
    const one = follow();
    last(one.streams).fire('refresh', {});
    last(one.streams).readyState = 0;
    last(one.streams).fire('error');
    one.pass(10_000);
    expect(one.refreshed()).toBe(2);
    last(one.streams).fire('same', {});
    expect(one.states).toEqual(['live', 'asking', 'live']);
    expect(one.streams).toHaveLength(1);
  });

  it('asks every ten seconds though the stream fails anew every three', () => {
    const one = follow();
    last(one.streams).readyState = 0;
    for (let second = 0; second < 30; second += 3) {
      last(one.streams).fire('error');
      one.pass(3_000);
    }
    expect(one.refreshed()).toBe(3);
    expect(one.states).toEqual(['asking']);
  });

  it('leaves nothing running once it is stopped', () => {
    const one = follow();
    last(one.streams).readyState = 2;
    last(one.streams).fire('error');
    one.stop();
    expect(one.waiting()).toBe(0);
    one.pass(120_000);
    expect(one.streams).toHaveLength(1);
    expect(one.refreshed()).toBe(0);
  });
});
