import type { APIContext } from 'astro';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBarnFeed } from '@/adapters/database/barn-news';
import type { Actor } from '@/domain/access/permission';
import { GET } from '@/pages/api/barn/[series]/live';
import { changeState } from '@/services/inspection/change-state';
import type { Ports } from '@/services/ports';
import { get, openInspection, openRaceNight, type RaceNight } from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let barn: ReturnType<typeof openBarnFeed>;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  barn = openBarnFeed(world.database.appUrl, () => undefined);
});
afterAll(async () => {
  await barn.close();
  await world.close();
});

const ask = async (
  more: {
    actor?: Actor | null;
    last?: string;
    since?: string;
    barn?: Ports['barn'];
    series?: string;
  } = {},
): Promise<Response> => {
  const headers = more.last === undefined ? {} : { 'last-event-id': more.last };
  const context = {
    request: new Request(
      `http://127.0.0.1/api/barn/x/live${more.since === undefined ? '' : `?since=${more.since}`}`,
      {
        headers,
      },
    ),
    params: { series: more.series ?? night.seriesId },
    locals: {
      ports: world.ports({ barn: more.barn ?? barn }),
      actor: more.actor === undefined ? night.inspector : more.actor,
    },
  };
  return (await GET(context as unknown as APIContext)) as Response;
};

interface Message {
  readonly event: string;
  readonly id: string | undefined;
  readonly data: unknown;
}

/** Reads the messages of a stream one after the other; nothing once it has ended. */
const reader = (response: Response) => {
  const body = response.body?.pipeThrough(new TextDecoderStream()).getReader();
  let text = '';
  return {
    next: async (): Promise<Message | undefined> => {
      while (!text.includes('\n\n')) {
        const read = await body?.read();
        if (read === undefined || read.done) return undefined;
        text += read.value;
      }
      const [message = '', ...rest] = text.split('\n\n');
      text = rest.join('\n\n');
      const fields = new Map(
        message
          .split('\n')
          .map((line) => [line.split(': ', 1)[0] ?? '', line.slice(line.indexOf(': ') + 2)]),
      );
      return {
        event: fields.get('event') ?? '',
        id: fields.get('id'),
        data: JSON.parse(fields.get('data') ?? 'null'),
      };
    },
    leave: () => body?.cancel(),
  };
};

const stop = async (inspectionId: string) =>
  get(
    await changeState(world.ports(), night.inspector, {
      act: world.ports().random.uuid(),
      inspectionId,
      to: 'stop',
      reason: 'Curfew',
    }),
  );

describe('the barn’s stream', () => {
  it('is nobody’s who may not read inspections there', async () => {
    expect((await ask({ actor: null })).status).toBe(401);
    expect((await ask({ actor: night.competitor })).status).toBe(404);
    const elsewhere = await addActor(world, 'Elsewhere', []);
    expect((await ask({ actor: elsewhere })).status).toBe(404);
    expect((await ask({ series: 'no-series' })).status).toBe(404);
  });

  it('tells whoever comes anew to read all, and whoever missed nothing that it is the same', async () => {
    const id = await openInspection(world, night, '1');
    const response = await ask();
    expect(response.headers.get('content-type')).toMatch(/^text\/event-stream/);
    expect(response.headers.get('cache-control')).toBe('no-store, no-transform');
    const first = reader(response);
    const hello = await first.next();
    expect(hello?.event).toBe('refresh');
    await first.leave();
    const again = reader(await ask({ last: hello?.id ?? '' }));
    expect((await again.next())?.event).toBe('same');
    await stop(id);
    const news = await again.next();
    expect(news).toMatchObject({ event: 'news', data: { inspection: id, state: 'stopped' } });
    expect(news?.id).not.toBe(hello?.id);
    await again.leave();
    const late = reader(await ask({ last: hello?.id ?? '' }));
    expect((await late.next())?.event).toBe('refresh');
    await late.leave();
    const made = reader(await ask({ since: news?.id ?? '' }));
    expect((await made.next())?.event).toBe('same');
    await made.leave();
    const current = reader(await ask({ last: news?.id ?? '' }));
    expect((await current.next())?.event).toBe('same');
    await current.leave();
  });

  it('ends when the server stops, and is refused where nothing can be heard', async () => {
    const own = openBarnFeed(world.database.appUrl, () => undefined);
    const open = reader(await ask({ barn: own }));
    expect((await open.next())?.event).toBe('refresh');
    await own.close();
    expect(await open.next()).toBeUndefined();
    expect((await ask({ barn: own })).status).toBe(503);
  });
});
