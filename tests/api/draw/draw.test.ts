import type { APIContext, APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { publicDrawAnswer } from '@/contracts/draw/draw';
import type { Actor } from '@/domain/access/permission';
import { GET as document } from '@/pages/api/draws/[series]/[draw]/documents/[name]';
import { GET as published } from '@/pages/api/draws/[series]/[draw]/index';
import { POST as picks } from '@/pages/api/draws/[series]/[draw]/picks';
import { POST as values } from '@/pages/api/draws/[series]/[draw]/values';
import { POST as endVoid } from '@/pages/api/draws/[series]/[draw]/void';
import { POST as announce } from '@/pages/api/draws/[series]/index';
import { findClassDraw } from '@/services/draw/find-class-draw';
import { enterCars } from '@/services/event/enter-cars';
import { get, openRaceNight, type RaceNight } from '../../support/bay';
import { runPrintedScript } from '../../support/draw';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';

let world: RecordWorld;
let night: RaceNight;

const uuid = () => world.ports().random.uuid();

beforeAll(async () => {
  world = await openRecordWorld();
  night = await openRaceNight(world);
  const { seriesId, eventId, classId, official } = night;
  const entries = ['7', '12J', '33', '58'].map((carNumber) => ({
    id: uuid(),
    classId,
    carNumber,
    competitorName: `Competitor ${carNumber}`,
    engineReference: '',
    position: null,
  }));
  get(await enterCars(world.ports(), official, { act: uuid(), seriesId, eventId, entries }));
  world.clock.set('2026-07-11T21:00:00.000Z');
});
afterAll(() => world.close());

interface Asked {
  readonly actor?: Actor | null;
  readonly body?: unknown;
  readonly params?: Readonly<Record<string, string>>;
}

const call = async (route: APIRoute, asked: Asked = {}): Promise<Response> => {
  const { actor = null, body, params = {} } = asked;
  const url = new URL('http://127.0.0.1/api/x');
  const request = new Request(url, {
    method: body === undefined ? 'GET' : 'POST',
    headers: { 'content-type': 'application/json' },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
  const at = { series: night.seriesId, ...params };
  const context = { request, url, params: at, locals: { ports: world.ports(), actor } };
  return (await route(context as unknown as APIContext)) as Response;
};

const NAME = 'Two dice at the drivers’ meeting: each one';

const announcement = async (more = {}) => {
  const { eventId, classId, official } = night;
  const found = await findClassDraw(world.ports(), official, { eventId, classId });
  return {
    act: uuid(),
    id: uuid(),
    eventId,
    classId,
    poolHash: found?.now.hash ?? '',
    select: 2,
    sessionAt: '2026-07-11T23:30:00.000Z',
    values: [{ name: NAME, ifMissing: 'void', substitute: '' }],
    ...more,
  };
};

const problemOf = async (response: Response) => {
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  const { type, errors } = (await response.json()) as {
    type: string;
    errors?: { pointer: string; detail: string }[];
  };
  return [response.status, type, errors?.map(({ pointer }) => pointer)];
};

describe('draws over the API', () => {
  let drawId: string;
  const ofDraw = (more: Asked = {}): Asked => ({
    ...more,
    params: { draw: drawId, ...more.params },
  });

  it('are announced by officials only, and every wrong field is named', async () => {
    const body = await announcement();
    expect((await call(announce, { body })).status).toBe(401);
    for (const actor of [night.competitor, night.inspector, night.chief])
      expect((await call(announce, { body, actor })).status).toBe(404);
    const wrong = await announcement({
      select: 0,
      sessionAt: 'tonight',
      values: [
        { name: ' ', ifMissing: 'perhaps', substitute: '' },
        { name: NAME, ifMissing: 'substitute', substitute: '' },
        { name: NAME, ifMissing: 'void', substitute: 'Laps' },
      ],
      secret: '00',
    });
    const [status, type, pointers] = await problemOf(
      await call(announce, { body: wrong, actor: night.official }),
    );
    expect([status, type]).toEqual([422, '/problems/invalid']);
    expect(pointers).toEqual(
      expect.arrayContaining([
        '/select',
        '/sessionAt',
        '/secret',
        '/values/0/name',
        '/values/0/ifMissing',
        '/values/1/substitute',
        '/values/2/substitute',
      ]),
    );
  });

  it('give the same answer to the same act, and a conflict to a second announcement', async () => {
    const body = await announcement();
    drawId = body.id;
    const once = await call(announce, { body, actor: night.official });
    expect(once.status).toBe(200);
    const answer = await once.text();
    expect(answer).not.toContain('"secret\\"');
    expect(await (await call(announce, { body, actor: night.official })).text()).toBe(answer);
    const again = await call(announce, { body: await announcement(), actor: night.official });
    expect(await problemOf(again)).toEqual([409, '/problems/not-in-this-state', undefined]);
  });

  it('are read by everybody, byte for byte, by the series’ id and its address', async () => {
    const answer = publicDrawAnswer.parse(await (await call(published, ofDraw())).json());
    expect(answer.end).toBeNull();
    const named = ofDraw({ params: { series: 'corran-valley', name: 'commitment.json' } });
    const file = await call(document, named);
    expect(file.headers.get('access-control-allow-origin')).toBe('*');
    expect(await file.text()).toBe(answer.announced.document);
    for (const name of ['made.json', 'void.json', 'secret.json'])
      expect((await call(document, ofDraw({ params: { name } }))).status).toBe(404);
    for (const draw of [uuid(), 'x'])
      expect((await call(published, ofDraw({ params: { draw } }))).status).toBe(404);
    expect((await call(published, ofDraw({ params: { series: 'elsewhere' } }))).status).toBe(404);
  });

  it('refuse values before the session, and from anybody but officials', async () => {
    const body = {
      act: uuid(),
      values: [{ name: NAME, source: 'announced', numbers: ['3', '5'] }],
    };
    const early = await call(values, ofDraw({ body, actor: night.official }));
    expect(await problemOf(early)).toEqual([409, '/problems/not-in-this-state', undefined]);
    world.clock.set('2026-07-12T02:00:00.000Z');
    expect((await call(values, ofDraw({ body }))).status).toBe(401);
    for (const actor of [night.competitor, night.inspector, night.chief]) {
      expect((await call(values, ofDraw({ body, actor }))).status).toBe(404);
      const reason = { act: uuid(), reason: 'No.' };
      expect((await call(endVoid, ofDraw({ body: reason, actor }))).status).toBe(404);
      const ids = { act: uuid(), inspectionIds: [uuid(), uuid()] };
      expect((await call(picks, ofDraw({ body: ids, actor }))).status).toBe(404);
    }
    const wrong = { act: uuid(), values: [{ name: NAME, source: 'announced', numbers: ['3.5'] }] };
    expect(
      await problemOf(await call(values, ofDraw({ body: wrong, actor: night.official }))),
    ).toEqual([422, '/problems/invalid', ['/values/0/numbers/0']]);
  });

  it('are made, verified by the printed script from the files alone, and picked', async () => {
    const body = {
      act: uuid(),
      values: [{ name: NAME, source: 'announced', numbers: ['3', '5'] }],
    };
    const done = await call(values, ofDraw({ body, actor: night.official }));
    expect(done.status).toBe(200);
    const { cars } = (await done.json()) as { cars: string[] };
    const reason = { act: uuid(), reason: 'We do not like it.' };
    const late = await call(endVoid, ofDraw({ body: reason, actor: night.official }));
    expect(await problemOf(late)).toEqual([409, '/problems/not-in-this-state', undefined]);
    const text = async (name: string) =>
      (await call(document, ofDraw({ params: { name } }))).text();
    expect(runPrintedScript(await text('commitment.json'), await text('made.json'))).toEqual({
      says: `same: ${cars.join(', ')}`,
      code: 0,
    });
    await signNow(world.ports(), night.seriesId);
    const answer = publicDrawAnswer.parse(await (await call(published, ofDraw())).json());
    expect([answer.announced.proof, answer.end?.proof]).not.toContain(null);
    const ids = { act: uuid(), inspectionIds: [uuid(), uuid()] };
    const picked = await call(picks, ofDraw({ body: ids, actor: night.official }));
    expect(await picked.json()).toEqual({
      cars: cars.map((car, i) => ({ car, state: 'picked', inspectionId: ids.inspectionIds[i] })),
    });
  });
});
