import { createHash, randomBytes, randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Actor, may, type Role } from '@/domain/access/permission';
import { ROUTES } from '@/http/route-table';
import { allOperations } from '@/pages/api/openapi.json';
import { demoParameters, pathOf } from '../support/demo-routes';
import { readProduct } from '../support/product';

const { publicUrl, superuserUrl } = readProduct();
const client = new pg.Client({ connectionString: superuserUrl });

/** Somebody at the door: `null` is not signed in. */
interface Visitor {
  readonly name: string;
  readonly token: string | null;
  readonly actor: Actor | null;
}

const visitors: Visitor[] = [];
let real: ReadonlyMap<string, string> = new Map();
let seriesId = '';

const one = async (sql: string, values: unknown[] = []): Promise<string> => {
  const found = await client.query(sql, values);
  const value: unknown = Object.values(found.rows[0] ?? {})[0];
  if (value === undefined) throw new Error(`The demo has nothing for: ${sql}`);
  return String(value);
};

/** A session of this person, put in by hand. */
const enter = async (name: string, personId: string): Promise<void> => {
  const token = randomBytes(32).toString('hex');
  const hash = createHash('sha256').update(token).digest();
  const sessionId = randomUUID();
  await client.query(
    `insert into public.session (id, token_hash, person_id, method, created_at, authenticated_at, seen_at, expires_at)
     values ($1, $2, $3, 'email-link', now(), now(), now(), now() + interval '1 hour')`,
    [sessionId, hash, personId],
  );
  const { rows } = await client.query<{ series_id: string; role: Role }>(
    'select series_id, role from public.membership where person_id = $1 and ended_at is null',
    [personId],
  );
  visitors.push({
    name,
    token,
    actor: {
      personId,
      name,
      sessionId,
      authenticatedAt: new Date().toISOString(),
      siteAdmin: false,
      standings: rows.map((row) => ({ seriesId: row.series_id, role: row.role })),
    },
  });
};

beforeAll(async () => {
  await client.connect();
  visitors.push({ name: 'nobody', token: null, actor: null });
  const stranger = randomUUID();
  await client.query(
    "insert into public.person (id, name, email, created_at) values ($1, 'A Stranger', $2, now())",
    [stranger, `${stranger}@example.org`],
  );
  await enter('a stranger', stranger);
  for (const name of [
    'Wren Halloway',
    'Perrin Oakhurst',
    'Edda Sorrel',
    'Oona Brannick',
    'Marit Quell',
    'Ilse Törnkvist',
    'Tamsin Orrick',
  ]) {
    await enter(name, await one('select id from public.person where name = $1', [name]));
  }
  seriesId = await one("select id from public.series where slug = 'corran-valley'");
  real = await demoParameters(client);
});
afterAll(() => client.end());

const methodOf = (route: string): string =>
  allOperations
    .find(({ path }) => path.replaceAll('{', '[').replaceAll('}', ']') === route)
    ?.method.toUpperCase() ?? 'GET';

const knock = async (visitor: Visitor, route: string, known: boolean) => {
  const path = pathOf(route, real, known);
  const method = methodOf(route);
  const response = await fetch(`${publicUrl}${path}`, {
    method,
    redirect: 'manual',
    headers: {
      origin: publicUrl,
      ...(method === 'GET' ? {} : { 'content-type': 'application/json' }),
      ...(visitor.token === null ? {} : { cookie: `tagwire_session=${visitor.token}` }),
    },
    ...(method === 'GET' ? {} : { body: '{}' }),
  });
  // A stream that was opened has no end to wait for.
  const streams = response.headers.get('content-type')?.startsWith('text/event-stream') === true;
  if (streams) await response.body?.cancel();
  const text = streams ? '' : await response.text();
  // What differs is only what was asked for, and acts made anew for each form.
  const said = text.replaceAll(path, '').replace(/[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f-]{22}/g, '');
  return { status: response.status, location: response.headers.get('location'), said };
};

const guarded = Object.entries(ROUTES).filter(([, { access }]) => access !== 'public');

describe.each(guarded)('%s', (route, rule) => {
  it('sends whoever is not signed in to the door', async () => {
    const [nobody] = visitors;
    if (nobody === undefined) throw new Error('no visitors');
    const met = await knock(nobody, route, true);
    if (route.startsWith('/api/')) expect(met.status).toBe(401);
    else expect([met.status, met.location?.startsWith('/sign-in')]).toEqual([303, true]);
  });

  it('answers whoever may not see it as if it did not exist', async () => {
    if (!route.includes('[')) return;
    for (const visitor of visitors.filter(({ actor }) => actor !== null)) {
      const allowed =
        rule.access === 'permission'
          ? may(visitor.actor, rule.permission, seriesId)
          : rule.access === 'own' && visitor.name === 'Wren Halloway';
      if (allowed) continue;
      // Inspectors and officials may look at files of paperwork that they work on.
      const official = visitor.actor?.standings.some(
        ({ role }) => role !== 'competitor' && role !== 'builder',
      );
      if (rule.access === 'own' && route.startsWith('/api/files/') && official) continue;
      const [met, unknown] = [
        await knock(visitor, route, true),
        await knock(visitor, route, false),
      ];
      expect([visitor.name, met.status, met.said]).toEqual([
        visitor.name,
        unknown.status,
        unknown.said,
      ]);
      expect(met.status).toBeGreaterThanOrEqual(400);
    }
  });

  it('opens to whoever may', async () => {
    if (methodOf(route) !== 'GET' || route.includes('[question]')) return;
    const holders = visitors.filter(({ name, actor }) =>
      rule.access === 'permission'
        ? may(actor, rule.permission, seriesId)
        : rule.access === 'own' && name === 'Wren Halloway' && route.includes('['),
    );
    for (const visitor of holders) {
      const met = await knock(visitor, route, true);
      // A finished thing leads to where it stands now; nobody who may is sent to the door.
      const led =
        [302, 303].includes(met.status) && !/^\/(sign-in|404)/.test(met.location ?? '/sign-in');
      expect([visitor.name, route, led ? 200 : met.status]).toEqual([visitor.name, route, 200]);
    }
  });
});
