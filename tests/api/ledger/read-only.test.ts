import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { gaugeFigures, get } from '../../support/bay';
import { openRecordWorld, type RecordWorld, writeLine } from '../../support/record';
import {
  startServer,
  startServices,
  type TestServer,
  type TestServices,
} from '../../support/servers';
import { eventually } from '../../support/wait';
import { addActor, addSeries } from '../../support/world';

const BANNER = /<aside class="read-only"/;
const PUBLIC = ['/', '/verify', '/bench', '/series/corran-valley', '/series/corran-valley/ledger'];
const SIGNED_IN = ['/office', '/barn', '/office/record'];

let world: RecordWorld;
let services: TestServices;
let server: TestServer;
let seriesId: string;
let admin: Actor;
let official: Actor;
let signed: number;

const tokenOf = (actor: Actor) => createHash('sha256').update(actor.personId).digest('hex');

/** A session as a sign-in leaves it. */
const signIn = async (actor: Actor) => {
  const client = await connect(world.database.superuserUrl);
  await client.query(
    `insert into public.session (id, token_hash, person_id, method, created_at, authenticated_at, seen_at, expires_at)
     values (gen_random_uuid(), $1, $2, 'email-link', now(), now(), now(), now() + interval '1 day')`,
    [createHash('sha256').update(tokenOf(actor)).digest(), actor.personId],
  );
  await client.end();
};

const ask = (path: string, actor?: Actor, form?: Readonly<Record<string, string>>) =>
  fetch(`${server.url}${path}`, {
    method: form === undefined ? 'GET' : 'POST',
    redirect: 'manual',
    headers: {
      origin: server.url,
      ...(actor && { cookie: `tagwire_session=${tokenOf(actor)}` }),
    },
    ...(form && { body: new URLSearchParams(form) }),
  });
const page = async (path: string, actor?: Actor) => (await ask(path, actor)).text();

const enterGauge = () =>
  fetch(`${server.url}/api/gauges/${seriesId}`, {
    method: 'POST',
    headers: {
      origin: server.url,
      'content-type': 'application/json',
      cookie: `tagwire_session=${tokenOf(official)}`,
    },
    body: JSON.stringify({
      act: world.ports().random.uuid(),
      id: world.ports().random.uuid(),
      version: 0,
      code: 'MC-01',
      description: gaugeFigures.micrometer,
      status: 'in-use',
    }),
  });

const cutTo = async (size: number) => {
  const client = await connect(world.database.superuserUrl);
  await client.query('set session_replication_role = replica');
  for (const sql of [
    'delete from record.ledger_content where series_id = $1 and line_index >= $2',
    'delete from record.ledger_line where series_id = $1 and index >= $2',
    'delete from record.ledger_node where series_id = $1 and (index + 1) << level > $2',
    'delete from record.checkpoint where series_id = $1 and size > $2',
    'update record.ledger_head set size = $2 where series_id = $1',
  ])
    await client.query(sql, [seriesId, size]);
  await client.end();
};

beforeAll(async () => {
  world = await openRecordWorld();
  seriesId = await addSeries(world);
  admin = await addActor(world, 'Administrator', [], true);
  official = await addActor(world, 'Ilse Törnkvist', [
    { seriesId, role: 'official' },
    { seriesId, role: 'chief-inspector' },
  ]);
  for (const actor of [admin, official]) await signIn(actor);
  services = await startServices();
  server = await startServer({ database: world.database, services });
  for (let i = 0; i < 5; i++) get(await writeLine(world.ports(), seriesId, `car ${i}`));
  signed = await eventually('a signed head over five lines', async () => {
    const answer = await fetch(`${server.url}/api/ledger/${seriesId}/checkpoint`);
    const size = Number((await answer.text()).split('\n')[1]);
    return answer.ok && size >= 5 ? size : undefined;
  });
});
afterAll(async () => {
  await server?.stop();
  await services?.stop();
  await world?.close();
});

describe('a server whose record is whole', () => {
  it('shows no banner, and says on the record’s page that all lines are there', async () => {
    for (const path of PUBLIC) expect([path, BANNER.test(await page(path))]).toEqual([path, false]);
    const state = await page('/office/record', admin);
    expect(state).not.toMatch(BANNER);
    expect(state).toContain('Every ledger holds all lines that were ever signed for');
    expect(state).not.toContain('name="reason"');
  });

  it('keeps the record’s page for site administrators', async () => {
    expect((await ask('/office/record')).headers.get('location')).toContain('/sign-in');
    expect((await ask('/office/record', official)).status).toBe(404);
    const form = { act: world.ports().random.uuid(), reason: 'The disk failed last night.' };
    expect((await ask('/office/record', official, form)).status).toBe(404);
    expect((await ask('/office/record', admin, form)).status).toBe(422);
  });
});

describe('a server that starts over an older copy of the database', () => {
  beforeAll(async () => {
    await server.stop();
    await cutTo(3);
    server = await startServer({ database: world.database, services });
  });

  it('says on every page that it is read-only, refuses to write, and goes on once it is on record', async () => {
    for (const path of PUBLIC) expect([path, BANNER.test(await page(path))]).toEqual([path, true]);
    for (const path of SIGNED_IN) {
      const actor = path === '/office/record' ? admin : official;
      expect([path, BANNER.test(await page(path, actor))]).toEqual([path, true]);
    }
    expect(await page('/no-such-page')).toMatch(BANNER);
    expect(await page('/office', admin)).toContain('href="/office/record"');
    expect(await page('/office', official)).not.toContain('href="/office/record"');

    const refused = await enterGauge();
    expect(refused.status).toBe(503);
    expect(await refused.json()).toMatchObject({ type: '/problems/read-only' });

    const state = await page('/office/record', admin);
    expect(state).toContain(`${signed} lines were signed`);
    expect(state).toContain('3 are there');
    const act = world.ports().random.uuid();
    const short = await ask('/office/record', admin, { act, reason: 'Oops' });
    expect(short.status).toBe(422);
    const said = await short.text();
    expect(said).toContain('Say in 10 to 2000 characters');
    expect(said).toContain('value="Oops"');

    const reason = 'The disk failed; the copy of Sunday was put back.';
    const done = await ask('/office/record', admin, { act, reason });
    expect([done.status, done.headers.get('location')]).toEqual([303, '/office/record']);
    for (const path of PUBLIC) expect([path, BANNER.test(await page(path))]).toEqual([path, false]);
    expect(await page('/office/record', admin)).toContain('Every ledger holds all lines');
    expect(await page('/series/corran-valley/ledger')).toContain(reason);
    expect((await enterGauge()).status).toBe(200);
  });
});
