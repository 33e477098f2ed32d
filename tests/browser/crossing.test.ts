import { createHash, randomBytes, randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { EMPTY_DRAFT } from '@/domain/paperwork/draft';
import { ROUTES } from '@/http/route-table';
import { allOperations } from '@/pages/api/openapi.json';
import { pathOf } from '../support/demo-routes';
import { readProduct } from '../support/product';

const { publicUrl, superuserUrl } = readProduct();
const client = new pg.Client({ connectionString: superuserUrl });

const BUILDER = 'Edda Sorrel';
const CUSTOMERS = ['Perrin Oakhurst', 'Greta Silverlock', 'Corin Weft'] as const;
const NOBODYS = '01900000-0000-7000-8000-000000000000';

/** What one customer has, or another engine of the first that the builder was not let onto. */
interface Owned {
  readonly owner: string;
  readonly paperwork: string;
  readonly engine: string;
  /** A photograph. */
  readonly file: string;
  readonly sheet: string | undefined;
  readonly entry: string;
  readonly notice: string | undefined;
  readonly versions: number;
  /** What the builder may do with it. */
  readonly rights: readonly string[];
}

const sessions = new Map<string, string>();
const things: Owned[] = [];

const one = async (sql: string, values: unknown[] = []): Promise<string | undefined> => {
  const found = await client.query(sql, values);
  const value: unknown = Object.values(found.rows[0] ?? {})[0];
  return value === undefined || value === null ? undefined : String(value);
};

const enter = async (name: string): Promise<void> => {
  const token = randomBytes(32).toString('hex');
  await client.query(
    `insert into public.session (id, token_hash, person_id, method, created_at, authenticated_at, seen_at, expires_at)
     select $1, $2, p.id, 'email-link', now(), now(), now(), now() + interval '1 hour'
     from public.person p where p.name = $3`,
    [randomUUID(), createHash('sha256').update(token).digest(), name],
  );
  sessions.set(name, token);
};

const ownedBy = async (owner: string): Promise<Owned> => {
  const { rows } = await client.query<
    Omit<Owned, 'owner' | 'rights' | 'notice' | 'sheet'> & {
      rights: string[] | null;
      notice: string | null;
      sheet: string | null;
    }
  >(
    `select p.id as paperwork, p.engine_id as engine, p.versions,
       (select f.id from public.file f where f.paperwork_id = p.id and f.purpose = 'photograph' and f.removed_at is null limit 1) as file,
       (select f.id from public.file f where f.paperwork_id = p.id and f.purpose = 'sheet' and f.removed_at is null limit 1) as sheet,
       (select e.id from public.entry e where e.competitor_id = o.id limit 1) as entry,
       (select v.number from record.verdict v join public.entry e on e.id = v.entry_id where e.competitor_id = o.id limit 1) as notice,
       (select g.rights from public.builder_grant g join public.person b on b.id = g.builder_id
        where b.name = $2 and g.competitor_id = o.id and p.engine_id = any(g.engine_ids)
          and g.withdrawn_at is null limit 1) as rights
     from public.paperwork p join public.person o on o.id = p.competitor_id
     where o.name = $1 order by p.versions desc, p.id limit 1`,
    [owner, BUILDER],
  );
  const [row] = rows;
  if (row?.rights == null) throw new Error(`The demo's builder has no grant of ${owner}.`);
  return {
    ...row,
    owner,
    rights: row.rights,
    notice: row.notice ?? undefined,
    sheet: row.sheet ?? undefined,
  };
};

/** A second engine of the first customer, with a draft and a picture, that the builder's grant does not name. */
const unlent = async (beside: Owned): Promise<Owned> => {
  const [engine, paperwork] = [randomUUID(), randomUUID()];
  const [file, sheet] = [randomUUID(), randomUUID()];
  await client.query(
    `insert into public.engine (id, owner_id, reference, layout, created_at)
     select $1, owner_id, $2, layout, now() from public.engine where id = $3`,
    [engine, `Other ${engine.slice(0, 8)}`, beside.engine],
  );
  await client.query(
    `insert into public.paperwork (series_id, id, class_id, competitor_id, engine_id, car_number, draft, updated_by, updated_at)
     select series_id, $1, class_id, competitor_id, $2, 'X1', draft, updated_by, now()
     from public.paperwork where id = $3`,
    [paperwork, engine, beside.paperwork],
  );
  for (const [id, of] of [
    [file, beside.file],
    [sheet, beside.sheet],
  ])
    await client.query(
      `insert into public.file (series_id, id, paperwork_id, purpose, item, name, declared_type, declared_bytes, upload_key,
         state, object_key, media_type, bytes, sha256, created_by, created_at, kept_at)
       select series_id, $1, $2, purpose, item, name, declared_type, declared_bytes, '', state, object_key, media_type,
         bytes, sha256, created_by, now(), now() from public.file where id = $3`,
      [id, paperwork, of],
    );
  return { ...beside, engine, paperwork, file, sheet, notice: undefined, versions: 0, rights: [] };
};

beforeAll(async () => {
  await client.connect();
  for (const name of [BUILDER, 'Wren Halloway', ...CUSTOMERS]) await enter(name);
  for (const name of CUSTOMERS) things.push(await ownedBy(name));
  const [first] = things;
  if (first !== undefined) things.push(await unlent(first));
});
afterAll(() => client.end());

/** Bodies that pass the contract, so that it is the permission that answers. */
const act = () => randomUUID();
const BODIES: Readonly<Record<string, () => unknown>> = {
  '/api/files/[file]/confirm': () => ({ act: act() }),
  '/api/files/[file]/remove': () => ({ act: act() }),
  '/api/files/[file]/sheet': () => ({ subject: 'lifter-sheet' }),
  '/api/paperwork/[paperwork]/draft': () => ({ act: act(), version: 1, draft: EMPTY_DRAFT }),
  '/api/paperwork/[paperwork]/hand-in': () => ({ act: act(), version: 1 }),
  '/api/paperwork/[paperwork]/files': () => ({
    act: act(),
    fileId: randomUUID(),
    purpose: 'photograph',
    item: 'lifters-racked',
    name: 'a.jpg',
    type: 'image/jpeg',
    bytes: 1000,
  }),
};

const parametersOf = (thing: Owned): ReadonlyMap<string, string> =>
  new Map(
    Object.entries({
      '/api/paperwork/[paperwork]': thing.paperwork,
      '/paddock/paperwork/[id]': thing.paperwork,
      '/paddock/engines/[id]': thing.engine,
      '/api/files/[file]': thing.file,
      '/api/sheets/[file]': thing.sheet ?? NOBODYS,
      '/paddock/verdicts/[number]': thing.notice ?? NOBODYS,
      '[width]': '160',
      '[sheet]': 'lifter-sheet',
      '[number]': '1',
    }),
  );

const methodsOf = (route: string): readonly string[] => {
  if (!route.startsWith('/api/')) return ['GET', 'POST'];
  return allOperations
    .filter(({ path }) => path.replaceAll('{', '[').replaceAll('}', ']') === route)
    .map(({ method }) => method.toUpperCase());
};

const ask = async (visitor: string, route: string, method: string, path: string) => {
  const isApi = route.startsWith('/api/');
  const form = new URLSearchParams({
    act: act(),
    version: '1',
    step: 'return',
    reason: 'crossing',
    kind: 'sold',
    email: 'x@example.org',
  });
  const response = await fetch(`${publicUrl}${path}`, {
    method,
    redirect: 'manual',
    headers: {
      origin: publicUrl,
      cookie: `tagwire_session=${sessions.get(visitor)}`,
      ...(method === 'GET'
        ? {}
        : { 'content-type': isApi ? 'application/json' : 'application/x-www-form-urlencoded' }),
    },
    ...(method === 'GET'
      ? {}
      : { body: isApi ? JSON.stringify(BODIES[route]?.() ?? {}) : form.toString() }),
  });
  const text = await response.text();
  const said = text.replaceAll(path, '').replace(/[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f-]{22}/g, '');
  return { status: response.status, said };
};

/** What the route asks of a builder, beyond seeing the paperwork; `owner` is open to nobody else. */
const NEEDS: Readonly<Record<string, string>> = {
  '/paddock/paperwork/[id]/withdraw': 'hand-in',
  '/paddock/engines/[id]/hand-over': 'owner',
  '/paddock/verdicts/[number]': 'verdicts',
};

const isOpen = (visitor: string, route: string, thing: Owned): boolean => {
  if (visitor === thing.owner) return true;
  if (visitor !== BUILDER) return false;
  const need = NEEDS[route];
  return need === undefined
    ? thing.rights.some((right) => right !== 'verdicts')
    : thing.rights.includes(need);
};

const owned = Object.entries(ROUTES)
  .filter(([route, { access }]) => access === 'own' && route.includes('['))
  .map(([route]) => route);

describe('every route that belongs to somebody', () => {
  it('is more than a few, with the engine’s, the paperwork’s and the file’s among them', () => {
    expect(owned.length).toBeGreaterThan(12);
    for (const part of [
      '/paddock/engines/[id]',
      '/paddock/paperwork/[id]',
      '/api/files/[file]/original',
      '/api/paperwork/[paperwork]/draft',
    ])
      expect(owned).toContain(part);
  });

  it('has its tries: four things, five people', () => {
    expect(things.map(({ owner, rights }) => [owner, rights.length])).toEqual([
      ['Perrin Oakhurst', 2],
      ['Greta Silverlock', 4],
      ['Corin Weft', 1],
      ['Perrin Oakhurst', 0],
    ]);
  });
});

describe.each(owned)('%s', (route) => {
  it('answers whoever it is not open to as if there were nothing', async () => {
    for (const thing of things) {
      for (const visitor of sessions.keys()) {
        if (isOpen(visitor, route, thing)) continue;
        for (const method of methodsOf(route)) {
          const path = pathOf(route, parametersOf(thing));
          const nothing = pathOf(
            route,
            parametersOf({
              ...thing,
              paperwork: NOBODYS,
              engine: NOBODYS,
              file: NOBODYS,
              sheet: NOBODYS,
              notice: undefined,
            }),
          );
          const met = await ask(visitor, route, method, path);
          const unknown = await ask(visitor, route, method, nothing);
          const what = `${visitor}: ${method} ${thing.owner}’s`;
          expect([what, met.status, met.said]).toEqual([what, unknown.status, unknown.said]);
          if (!route.startsWith('/api/') || BODIES[route] || method === 'GET')
            expect([what, met.status]).toEqual([what, 404]);
        }
      }
    }
  });

  it('opens to its owner, and to the builder as far as they are let', async () => {
    if (!methodsOf(route).includes('GET')) return;
    for (const thing of things) {
      if (route.includes('versions') && thing.versions === 0) continue;
      if (route.includes('verdicts') && thing.notice === undefined) continue;
      if (route.includes('/sheets/') && thing.sheet === undefined) continue;
      for (const visitor of [thing.owner, BUILDER]) {
        if (!isOpen(visitor, route, thing)) continue;
        const { status } = await ask(visitor, route, 'GET', pathOf(route, parametersOf(thing)));
        // A finished thing leads to where it stands now.
        const open = status < 404 || status === 409;
        expect([visitor, thing.owner, open ? 'open' : status]).toEqual([
          visitor,
          thing.owner,
          'open',
        ]);
      }
    }
  });
});

describe('ids in what is sent', () => {
  const post = (visitor: string, path: string, body: URLSearchParams | string) =>
    fetch(`${publicUrl}${path}`, {
      method: 'POST',
      redirect: 'manual',
      headers: {
        origin: publicUrl,
        cookie: `tagwire_session=${sessions.get(visitor)}`,
        'content-type':
          typeof body === 'string' ? 'application/json' : 'application/x-www-form-urlencoded',
      },
      body: typeof body === 'string' ? body : body.toString(),
    });

  it('of another’s car: no engine is swapped into it', async () => {
    for (const thing of things.slice(0, 3)) {
      for (const visitor of sessions.keys()) {
        if (visitor === thing.owner) continue;
        const swap = {
          act: act(),
          id: randomUUID(),
          entryId: thing.entry,
          engine: { id: thing.engine },
          seal: '1',
          paperworkId: randomUUID(),
          photograph: { fileId: randomUUID(), sha256: '0'.repeat(64) },
        };
        expect([visitor, (await post(visitor, '/api/swaps', JSON.stringify(swap))).status]).toEqual(
          [visitor, 404],
        );
      }
    }
  });

  it('of another’s grant: it stays as it is', async () => {
    const grants = async () =>
      (
        await client.query(
          'select id, competitor_id from public.builder_grant where withdrawn_at is null order by id',
        )
      ).rows as { id: string }[];
    const before = await grants();
    expect(before.length).toBeGreaterThanOrEqual(3);
    for (const { id } of before)
      await post(
        'Wren Halloway',
        '/paddock/builders',
        new URLSearchParams({ act: act(), step: 'withdraw', grant: id }),
      );
    expect(await grants()).toEqual(before);
  });

  it('of another’s engine: no paperwork is begun of it, no builder let onto it', async () => {
    const [first] = things;
    const raceClass = await one('select class_id from public.paperwork where id = $1', [
      first?.paperwork,
    ]);
    const counted = () =>
      one('select count(*) from public.paperwork where engine_id = $1', [first?.engine]);
    const before = await counted();
    const fields = {
      act: act(),
      id: randomUUID(),
      engineAct: act(),
      engineId: randomUUID(),
      class: raceClass ?? '',
      engine: first?.engine ?? '',
      carNumber: 'Z9',
    };
    for (const visitor of ['Wren Halloway', 'Greta Silverlock', BUILDER])
      expect(
        (
          await post(
            visitor,
            '/paddock/paperwork/new',
            new URLSearchParams({ ...fields, act: act(), id: randomUUID() }),
          )
        ).status,
      ).toBe(422);
    expect(await counted()).toBe(before);
    const grant = new URLSearchParams({
      act: act(),
      email: 'x@example.org',
      engine: first?.engine ?? '',
      right: 'sheets',
      until: `${new Date().getUTCFullYear() + 1}-01-01`,
    });
    await post('Wren Halloway', '/paddock/builders', grant);
    expect(
      await one("select count(*) from public.builder_grant where email = 'x@example.org'"),
    ).toBe('0');
  });
});
