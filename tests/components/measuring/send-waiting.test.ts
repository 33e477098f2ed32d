import { describe, expect, it } from 'vitest';
import type { KeptAct } from '@/components/measuring/queue/device-store';
import {
  type PictureAnswer,
  type PostAnswer,
  sendWaiting,
} from '@/components/measuring/queue/send-waiting';
import { uuidV7 } from '@/components/measuring/queue/uuid-v7';
import { checkRow } from '@/components/measuring/sheet/rows';
import type { CapturesRequest } from '@/contracts/inspection/captures';

const WHOLE = { bank: '', cylinder: '', valve: '' } as const;

/** A device and a server that remembers acts, as the real one does. */
const bay = (
  count: number,
  answer: (body: CapturesRequest, nth: number) => PostAnswer | 'lost',
  bring: (pictureId: string) => PictureAnswer = () => ({ kind: 'kept' }),
) => {
  const acts: KeptAct[] = Array.from({ length: count }, (_, i) => ({
    seq: i + 1,
    inspectionId: i < count - 1 || count < 3 ? 'a' : 'b',
    rows: [checkRow(WHOLE, 'subject', String(i + 1))],
    state: 'waiting',
    keptAt: 0,
  }));
  const posts: CapturesRequest[] = [];
  const served = new Map<string, string>();
  let made = 0;
  const send = () =>
    sendWaiting({
      readWaiting: async () => acts.filter((act) => act.state === 'waiting'),
      changeActs: async (seqs, change) => {
        for (const seq of seqs) acts[seq - 1] = change(acts[seq - 1] as KeptAct);
      },
      sendPicture: async (pictureId) => bring(pictureId),
      newSending: () => {
        made += 1;
        return { act: `sending-${made}`, clockOffsetMs: made * 1000 };
      },
      post: async (_id, body) => {
        posts.push(body);
        const reply = answer(body, posts.length);
        const kept = reply === 'lost' || reply.kind === 'kept';
        const content = JSON.stringify(body);
        if (kept && (served.get(body.act) ?? content) !== content)
          throw new Error('the same act with other content');
        if (kept) served.set(body.act, content);
        return reply === 'lost' ? { kind: 'unreachable' } : reply;
      },
    });
  const values = (body: CapturesRequest) =>
    body.rows.map((row) => (row.kind === 'remark' && 'value' in row ? row.value : ''));
  const server = () => [...served.values()].flatMap((body) => values(JSON.parse(body)));
  return { acts, posts, send, server, values };
};

const kept: PostAnswer = {
  kind: 'kept',
  answer: { batch: 1, head: '', receivedAt: '', received: [], marked: [] },
};

describe('what waits on the device', () => {
  it('goes in order, one inspection at a time', async () => {
    const { posts, send, server, values } = bay(5, () => kept);
    expect(await send()).toBe('all-sent');
    expect(posts.map(values)).toEqual([['1', '2', '3', '4'], ['5']]);
    expect(server()).toEqual(['1', '2', '3', '4', '5']);
  });

  it('is the same act to the server when the answer was lost, whatever came to wait since', async () => {
    const { acts, posts, send, server } = bay(2, (_body, nth) => (nth === 1 ? 'lost' : kept));
    expect(await send()).toBe('unreachable');
    expect(acts.map((act) => act.state)).toEqual(['waiting', 'waiting']);
    acts.push({
      seq: 3,
      inspectionId: 'a',
      rows: [checkRow(WHOLE, 'subject', '3')],
      state: 'waiting',
      keptAt: 1,
    });
    expect(await send()).toBe('all-sent');
    expect(posts[1]).toEqual(posts[0]);
    expect(server()).toEqual(['1', '2', '3']);
  });

  it('is taken apart when refused, so that one bad row holds up no other and is not lost', async () => {
    const bad = {
      kind: 'refused',
      detail: 'One entry needs correcting.',
      places: ['No.'],
    } as const;
    const { acts, send, server } = bay(4, (body) =>
      JSON.stringify(body.rows).includes('"value":"2"') ? bad : kept,
    );
    expect(await send()).toBe('all-sent');
    expect(server()).toEqual(['1', '3', '4']);
    expect(acts.map((act) => act.state)).toEqual(['sent', 'refused', 'sent', 'sent']);
    expect(acts[1]?.problem).toBe('One entry needs correcting. No.');
  });

  it('stays when the person has to sign in again', async () => {
    const { acts, send } = bay(2, () => ({ kind: 'sign-in' }));
    expect(await send()).toBe('sign-in');
    expect(acts.every((act) => act.state === 'waiting')).toBe(true);
  });
});

describe('ids made on the device', () => {
  it('are version 7, and in order even when made within one millisecond or a clock set back', () => {
    const ids = [1_800_000_000_000, 1_800_000_000_000, 1_799_999_999_000, 1_800_000_000_001].map(
      (now) => uuidV7(now),
    );
    for (const id of ids)
      expect(id).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
    expect([...ids].sort()).toEqual(ids);
    expect(new Set(ids).size).toBe(4);
  });
});

describe('photographs that wait on the device', () => {
  const withPictures = (bring: (pictureId: string) => PictureAnswer) => {
    const brought: string[] = [];
    const made = bay(
      4,
      () => kept,
      (id) => {
        brought.push(id);
        return bring(id);
      },
    );
    for (const [at, act] of made.acts.entries())
      made.acts[at] = { ...act, inspectionId: 'a', ...(at < 2 ? { pictureId: `p${at + 1}` } : {}) };
    return { ...made, brought };
  };

  it('go after the numbers and in their own order, each row once its picture is there', async () => {
    const { send, posts, values, brought, server } = withPictures(() => ({ kind: 'kept' }));
    expect(await send()).toBe('all-sent');
    expect(posts.map(values)).toEqual([['3', '4'], ['1'], ['2']]);
    expect(brought).toEqual(['p1', 'p2']);
    expect(server().sort()).toEqual(['1', '2', '3', '4']);
  });

  it('without signal wait for it; no row goes without its picture', async () => {
    let signal = false;
    const { send, server, acts } = withPictures(() => ({
      kind: signal ? 'kept' : 'unreachable',
    }));
    expect(await send()).toBe('unreachable');
    expect(server()).toEqual(['3', '4']);
    expect(acts.filter(({ state }) => state === 'waiting')).toHaveLength(2);
    signal = true;
    expect(await send()).toBe('all-sent');
    expect(server()).toEqual(['3', '4', '1', '2']);
  });

  it('that are refused stay with the words, and hold up no other', async () => {
    const { send, server, acts } = withPictures((id) =>
      id === 'p1' ? { kind: 'refused', detail: 'This is no picture.' } : { kind: 'kept' },
    );
    expect(await send()).toBe('all-sent');
    expect(acts[0]).toMatchObject({ state: 'refused', problem: 'This is no picture.' });
    expect(server()).toEqual(['3', '4', '2']);
  });
});
