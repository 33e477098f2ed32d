import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { openInspection, openRaceNight, rowsFor, send } from '../../support/bay';
import { openWorld, type World } from '../../support/world';

type Client = Awaited<ReturnType<typeof connect>>;

let world: World;
let app: Client;
let superuser: Client;
let tables: readonly string[];

beforeAll(async () => {
  world = await openWorld();
  const night = await openRaceNight(world);
  const id = await openInspection(world, night, '1');
  await send(world, night.inspector, id, rowsFor(world, night).fullBore());
  app = await connect(world.database.appUrl);
  superuser = await connect(world.database.superuserUrl);
  const { rows } = await superuser.query<{ name: string }>(
    `select c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace
     where n.nspname = 'record' and c.relkind in ('r', 'p', 'v', 'm', 'f') order by 1`,
  );
  tables = rows.map((row) => row.name);
});
afterAll(async () => {
  await app.end();
  await superuser.end();
  await world.close();
});

const refusal = async (sql: string): Promise<string | undefined> => {
  try {
    await app.query(sql);
    return undefined;
  } catch (error) {
    return (error as { code?: string }).code;
  }
};

const DENIED = '42501';

describe('the record, as the application’s role', () => {
  it('is more than a few tables, readings and the ledger among them', () => {
    expect(tables.length).toBeGreaterThan(12);
    expect(tables).toEqual(
      expect.arrayContaining(['act', 'capture_batch', 'ledger_line', 'reading', 'report', 'rules']),
    );
  });

  it('refuses update, delete, truncate and insert on every table, by privilege', async () => {
    const outcome: Record<string, readonly (string | undefined)[]> = {};
    for (const table of tables) {
      const { rows } = await superuser.query<{ name: string }>(
        `select attname as name from pg_attribute
         where attrelid = ('record.' || quote_ident($1))::regclass and attnum > 0 and not attisdropped
         order by attnum limit 1`,
        [table],
      );
      const column = rows[0]?.name ?? '';
      outcome[table] = [
        await refusal(`update record."${table}" set "${column}" = "${column}"`),
        await refusal(`delete from record."${table}"`),
        await refusal(`truncate record."${table}"`),
        await refusal(`insert into record."${table}" select * from record."${table}"`),
        await refusal(`insert into record."${table}" default values`),
        await refusal(`select 1 from record."${table}" for update`),
      ];
    }
    expect(outcome).toEqual(
      Object.fromEntries(tables.map((table) => [table, Array.from({ length: 6 }, () => DENIED)])),
    );
  });

  it('can be read there, so that the refusals above are not those of a stranger', async () => {
    for (const table of tables)
      expect(await refusal(`select * from record."${table}" limit 1`)).toBeUndefined();
    const { rows } = await app.query<{ n: number }>(
      'select count(*)::int as n from record.reading',
    );
    expect(rows[0]?.n).toBe(5);
  });

  it('cannot be owned, disguised or reached around', async () => {
    for (const sql of [
      'alter table record.reading add column forged text',
      'drop table record.reading',
      'create trigger forge before insert on record.reading for each row execute function now()',
      'alter table record.reading disable trigger all',
      'create table record.forged (n integer)',
      'create function append.forge() returns integer language sql as $$ select 1 $$',
      'create or replace function append.reading(p_rows jsonb) returns integer language sql as $$ select 1 $$',
      'set session_replication_role = replica',
      "select append.answer_act((select id from record.act limit 1), '{}'::jsonb)",
    ])
      expect([sql, await refusal(sql)]).toEqual([sql, DENIED]);
    // PostgreSQL only warns that nothing was granted; what counts is that nothing was.
    await app.query('grant all on record.reading to current_user');
    expect(await refusal('delete from record.reading')).toBe(DENIED);
  });
});
