import type { EntityManager, MikroORM } from '@mikro-orm/postgresql';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import type { AuditFault } from '@/services/ledger/audit/fault';
import { openRecordOfANight, type RecordOfANight } from '../../support/record-of-a-night';

let record: RecordOfANight;
let superuser: MikroORM;
let nightId: string;
/** Heads that somebody outside kept: the last before the tampering of each series, and an early one. */
let receipts: readonly string[];
let early: readonly string[];

beforeAll(async () => {
  record = await openRecordOfANight();
  nightId = record.night.seriesId;
  receipts = [...record.kept.values()].map(({ last }) => last);
  early = [...record.kept.values()].map((heads) => heads.early);
  superuser = await openDatabase(record.world.database.superuserUrl, 2);
  // Whoever may do anything is not stopped by a constraint either.
  const { em } = superuser;
  const checks = await em.fork().execute<{ sql: string }[]>(
    `select format('alter table %s drop constraint %I', conrelid::regclass, conname) as sql
     from pg_constraint c join pg_namespace n on n.oid = c.connamespace
     where n.nspname = 'record' and c.contype = 'c'`,
  );
  for (const { sql } of checks) await em.fork().execute(sql);
  const unique = await em.fork().execute<{ sql: string }[]>(
    `select case when k.oid is null then format('drop index %s', i.indexrelid::regclass)
       else format('alter table %s drop constraint %I cascade', i.indrelid::regclass, k.conname)
       end as sql
     from pg_index i join pg_class c on c.oid = i.indrelid
     join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     left join pg_constraint k on k.conindid = i.indexrelid and k.contype = 'u'
     where i.indisunique and not i.indisprimary`,
  );
  for (const { sql } of unique) await em.fork().execute(sql);
  const needed = await em.fork().execute<{ sql: string }[]>(
    `select format('alter table record.%I alter column %I drop not null', c.relname, a.attname) as sql
     from pg_class c join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     join pg_attribute a on a.attrelid = c.oid and a.attnum > 0 and a.attnotnull
     left join pg_index i on i.indrelid = c.oid and i.indisprimary
     where c.relkind = 'r' and not a.attnum = any(coalesce(i.indkey::int2[], '{}'))`,
  );
  for (const { sql } of needed) await em.fork().execute(sql);
});
afterAll(async () => {
  await superuser.close();
  await record.world.close();
});

class Undo extends Error {}

/** Of all series, or of one where it is known whose row was touched. */
const audit = async (
  em: EntityManager,
  heads: readonly string[],
  only?: string | null,
): Promise<AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (const [seriesId, { key }] of record.kept) {
    if (only && only !== seriesId) continue;
    const own = heads.filter((head) => head.includes(seriesId));
    const asked = { seriesId, heads: own, keys: [key] };
    faults.push(...(await auditLedger({ db: em, objects: record.objects }, asked)).faults);
  }
  return faults;
};

/** What the audit names after this was done by a superuser, which is then undone. */
const tampered = async (
  work: (em: EntityManager) => Promise<unknown>,
  heads: readonly string[] = receipts,
  only?: string | null,
): Promise<readonly AuditFault[]> => {
  let faults: readonly AuditFault[] = [];
  try {
    await superuser.em.fork().transactional(async (em) => {
      await em.execute('set local session_replication_role = replica');
      await work(em);
      faults = await audit(em, heads, only);
      throw new Undo();
    });
  } catch (error) {
    if (!(error instanceof Undo)) throw error;
  }
  return faults;
};

const wheres = (faults: readonly AuditFault[]) => [...new Set(faults.map(({ where }) => where))];
const names = (faults: readonly AuditFault[], table: string): boolean =>
  wheres(faults).some((where) => where.split(' or ').includes(`record.${table}`));

/** Another value of the column's type, whatever it is; NULL is one too, where there was a value. */
const OTHER: Readonly<Record<string, string>> = {
  text: "coalesce(%c, '') || ' '",
  uuid: 'gen_random_uuid()',
  bytea: "coalesce(set_byte(%c, 0, (get_byte(%c, 0) + 1) % 256), '\\x00')",
  boolean: 'not %c',
  integer: 'coalesce(%c, 0) + 1000',
  smallint: '%c + 40',
  bigint: 'coalesce(%c, 0) + 1000',
  numeric: '%c + 1',
  jsonb: `jsonb_build_object('was', %c)`,
  xid8: "'7'::xid8",
  date: "coalesce(%c, date '2026-01-01') + 1",
  'timestamp with time zone': "coalesce(%c, now()) + interval '1 second'",
};

/** Tables of the record of which this world holds no row, each with the reason. */
const WITHOUT_ROWS: Readonly<Record<string, string>> = {};

interface Table {
  readonly name: string;
  readonly columns: readonly { readonly name: string; readonly type: string }[];
}

const readTables = async (): Promise<readonly Table[]> => {
  const rows = await superuser.em.fork().execute<{ table: string; name: string; type: string }[]>(
    `select c.relname as table, a.attname as name, format_type(a.atttypid, null) as type
     from pg_class c
     join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     join pg_attribute a on a.attrelid = c.oid and a.attnum > 0 and not a.attisdropped
     where c.relkind = 'r' and c.relname <> 'schema_change' order by 1, a.attnum`,
  );
  return [...new Set(rows.map(({ table }) => table))].map((name) => ({
    name,
    columns: rows.filter(({ table }) => table === name),
  }));
};

/**
 * Rows of a table, by place: the first, the last and one between, as the erased and the kept lie apart.
 * Of acts those that wrote a line; of rules those that a signed document names.
 */
const sampleOf = (em: EntityManager, table: string) => {
  const from: Readonly<Record<string, string>> = {
    act: `record.act t where exists (select from record.ledger_line l where l.act_id = t.id)`,
    rules: `record.rules t where exists (select from record.report r where r.rules_hash = t.hash)`,
    checkpoint: `record.checkpoint t where (t.series_id, t.size) in
      (select series_id, max(size) from record.checkpoint group by 1)`,
    zero: `record.zero t where exists (select from record.report r
      where r.inspection_id = t.inspection_id)`,
  };
  return em.execute<{ place: string; series: string | null }[]>(
    `with rows as (select t.ctid as place, to_jsonb(t) ->> 'series_id' as series, row_number() over (order by t.ctid) as n, count(*) over () as m
       from ${from[table] ?? `record."${table}" t`})
     select place::text, series from rows where n in (1, (m + 1) / 2, m) order by n`,
  );
};

describe('an audit with heads that were issued before', () => {
  it('finds nothing where nothing was done', async () => {
    expect(await tampered(async () => undefined, [...receipts, ...early])).toEqual([]);
    for (const [seriesId, { key, last }] of record.kept) {
      const found = await auditLedger(record.ports(), { seriesId, heads: [last], keys: [key] });
      expect(found.faults).toEqual([]);
      expect(found.lines).toBeGreaterThan(5);
    }
  });

  it('names the table of every column of every kind of row that is altered', async () => {
    const missed = new Set<string>();
    const untouched: string[] = [];
    let altered = 0;
    let columns = 0;
    const tables = await readTables();
    for (const table of tables) {
      const places = await sampleOf(superuser.em.fork(), table.name);
      if (places.length === 0) untouched.push(table.name);
      else columns += table.columns.length;
      for (const { place, series } of places) {
        for (const { name, type } of table.columns) {
          const other = OTHER[type]?.replaceAll('%c', `"${name}"`);
          if (other === undefined) throw new Error(`no other value for the type ${type}`);
          const faults = await tampered(
            async (em) => {
              const changed = await em.execute<unknown[]>(
                `update record."${table.name}" set "${name}" = ${other} where ctid = '${place}' returning 1`,
              );
              altered += changed.length;
            },
            receipts,
            series,
          );
          if (!names(faults, table.name)) missed.add(`${table.name}.${name}`);
        }
      }
    }
    expect([...missed].sort()).toEqual([]);
    expect(untouched).toEqual(Object.keys(WITHOUT_ROWS));
    console.info(`altered ${altered} values in ${columns} columns of ${tables.length} tables`);
  }, 600_000);

  it('names content that is taken away without a line that says so', async () => {
    for (const [table, column] of [
      ['ledger_content', 'content'],
      ['ledger_content', 'salt'],
      ['paperwork_version', 'document'],
      ['signature_strokes', 'strokes'],
    ] as const) {
      const kept = await superuser.em.fork().execute<{ place: string }[]>(
        `select ${table === 'ledger_content' ? 'distinct on (role)' : ''} ctid::text as place
           from record."${table}" where "${column}" is not null`,
      );
      expect(kept.length).toBeGreaterThan(0);
      for (const { place } of kept) {
        const faults = await tampered((em) =>
          em.execute(`update record."${table}" set "${column}" = null where ctid = '${place}'`),
        );
        expect([table, column, place, names(faults, table)]).toEqual([table, column, place, true]);
      }
    }
  }, 120_000);

  it('names erased content that came back', async () => {
    for (const [table, column] of [
      ['ledger_content', 'content'],
      ['paperwork_version', 'document'],
      ['signature_strokes', 'strokes'],
    ] as const) {
      const faults = await tampered((em) =>
        em.execute(
          `update record."${table}" set "${column}" = '{}' where ctid =
             (select ctid from record."${table}" where "${column}" is null
              ${table === 'ledger_content' ? 'and salt is null' : ''} limit 1)`,
        ),
      );
      expect(faults.map(({ where, words }) => [where, words])).toContainEqual([
        `record.${table}`,
        expect.stringMatching(/erased/),
      ]);
    }
  });

  it('names the table from which a row is deleted', async () => {
    for (const { name: table } of await readTables())
      for (const { place } of await sampleOf(superuser.em.fork(), table)) {
        const faults = await tampered((em) =>
          em.execute(`delete from record."${table}" where ctid = '${place}'`),
        );
        expect([table, place, names(faults, table)]).toEqual([table, place, true]);
      }
  }, 120_000);

  it('names a row that was put in, though every column is right for its place', async () => {
    const withId = (await readTables())
      .filter(({ name, columns }) => name !== 'act' && columns.some((one) => one.name === 'id'))
      .map(({ name }) => [name, 'id = gen_random_uuid()'] as const);
    expect(withId.length).toBeGreaterThan(15);
    for (const [table, change] of [
      ...withId,
      ['bulletin_engine', 'paperwork_id = gen_random_uuid()'],
      ['event_clearance', 'number = number + 1'],
      ['guardian_signature', 'number = number + 7'],
      ['paperwork_withdrawal', 'paperwork_id = gen_random_uuid()'],
      ['result_statement', 'number = number + 7'],
      ['capture_batch', 'number = number + 7'],
      ['report', 'revision = revision + 1'],
      ['signature_strokes', 'revision = revision + 1'],
      ['rule_publication', 'id = gen_random_uuid(), number = number + 1'],
      ['verdict', "id = gen_random_uuid(), number = '2026-777', report_revision = 7"],
      ['paperwork_version', 'number = number + 1'],
      ['paperwork_decision', 'id = gen_random_uuid(), number = number + 1'],
      ['draw', "id = gen_random_uuid(), follows = repeat('a', 64)"],
      ['draw_end', 'draw_id = gen_random_uuid()'],
      ['notice_pdf', 'verdict_id = gen_random_uuid()'],
      ['erasure', "role = 'rows'"],
      ['ledger_line', 'index = index + 1000'],
      ['ledger_content', "role = 'other'"],
      ['ledger_node', 'index = index + 1000'],
    ] as const) {
      const [first] = await sampleOf(superuser.em.fork(), table);
      const faults = await tampered(async (em) => {
        await em.execute(
          `create temp table put on commit drop as select * from record."${table}" where ctid = '${first?.place}'`,
        );
        await em.execute(`update put set ${change}`);
        await em.execute(`insert into record."${table}" select * from put`);
      });
      expect([table, names(faults, table)]).toEqual([table, true]);
    }
  }, 120_000);

  it('names a row put into any table, under an act whose line knows of none', async () => {
    const seen: string[] = [];
    const batched = ['reading', 'zero', 'remark', 'capture_batch', 'ledger_line'];
    for (const { name, columns } of await readTables()) {
      if (batched.includes(name) || !columns.some((column) => column.name === 'act_id')) continue;
      // A primary key takes no null: every column of one gets some value of its type.
      const faults = await tampered(async (em) => {
        const keys = await em.execute<{ name: string; type: string }[]>(
          `select a.attname as name, format_type(a.atttypid, null) as type from pg_index i
           join pg_attribute a on a.attrelid = i.indrelid and a.attnum = any(i.indkey)
           where i.indrelid = 'record."${name}"'::regclass and i.indisprimary`,
        );
        const value = (column: { name: string; type: string }) =>
          column.name === 'series_id'
            ? `'${nightId}'::uuid`
            : column.type === 'uuid'
              ? 'gen_random_uuid()'
              : column.type === 'text'
                ? "'put in'"
                : `'9'::${column.type}`;
        await em.execute(
          `insert into record."${name}" (${[...keys.map((key) => `"${key.name}"`), 'act_id'].join(', ')})
           select ${keys.map(value).join(', ')}${keys.length > 0 ? ',' : ''} act_id
           from record.ledger_line where series_id = '${nightId}' and kind = 'rulebook-published' limit 1`,
        );
      });
      seen.push(name);
      expect([name, names(faults, name)]).toEqual([name, true]);
    }
    expect(seen.length).toBeGreaterThan(25);
    console.info(`a row put in was named in each of: ${seen.join(', ')}`);
  }, 120_000);

  it('names lines that were swapped, though each is whole', async () => {
    const faults = await tampered(async (em) => {
      const at = `series_id = '${nightId}' and index`;
      await em.execute(`update record.ledger_line set index = -1 where ${at} = 1`);
      await em.execute(`update record.ledger_line set index = 1 where ${at} = 2`);
      await em.execute(`update record.ledger_line set index = 2 where ${at} = -1`);
    });
    expect(wheres(faults)).toEqual(
      expect.arrayContaining(['record.ledger_line', 'record.checkpoint']),
    );
  });

  it('is not deceived by one who works every hash of the database out anew', async () => {
    const faults = await tampered(async (em) => {
      const own = `series_id = '${nightId}'`;
      const rows = await em.execute<{ index: string; line: string }[]>(
        `select index, line from record.ledger_line where ${own} order by index`,
      );
      await em.execute(`delete from record.ledger_node where ${own}`);
      await em.execute(`update record.ledger_line set index = index + 1000 where ${own}`);
      await em.execute(
        `create temp table kept on commit drop as select * from record.ledger_content where ${own}`,
      );
      await em.execute(`delete from record.ledger_content where ${own}`);
      await em.execute(`delete from record.ledger_line where ${own}`);
      await em.execute(`update record.ledger_head set size = 0 where ${own}`);
      for (const { index, line } of rows) {
        const forged = index === '1' ? line.replace('.000Z', '.001Z') : line;
        const { kind, act } = JSON.parse(forged) as { kind: string; act: string };
        await em.execute(`select append.ledger_line(?, ?, ?, ?, ?, '[]'::jsonb)`, [
          nightId,
          index,
          kind,
          forged,
          act,
        ]);
      }
      await em.execute('insert into record.ledger_content select * from kept');
      await em.execute(`delete from record.checkpoint where ${own}`);
    });
    expect(faults.map(({ words }) => words)).toEqual(
      expect.arrayContaining([expect.stringMatching(/are not those it was signed over/)]),
    );
  });

  it('counts the lines that are gone when the tail is cut or an older copy is restored', async () => {
    const cut = async (em: EntityManager) => {
      const tail = `series_id = '${nightId}' and`;
      await em.execute(`delete from record.ledger_content where ${tail} line_index >= 3`);
      await em.execute(`delete from record.ledger_line where ${tail} index >= 3`);
      await em.execute(`delete from record.ledger_node where ${tail} (index + 1) << level > 3`);
      await em.execute(`delete from record.checkpoint where ${tail} size > 3`);
      await em.execute(`update record.ledger_head set size = 3 where series_id = '${nightId}'`);
      for (const table of ['report', 'verdict', 'notice_pdf'])
        await em.execute(`delete from record."${table}"`);
    };
    const faults = await tampered(cut);
    expect(faults.map(({ words }) => words)).toEqual(
      expect.arrayContaining([expect.stringMatching(/of them are gone/)]),
    );
  });

  it('names an object that was replaced, changed or removed', async () => {
    const { stored } = record.objects;
    const keys = [...stored.keys()];
    expect(keys.filter((one) => one.startsWith('notices/'))).toHaveLength(1);
    expect(keys.filter((one) => one.startsWith('originals/')).length).toBeGreaterThan(2);
    for (const one of keys) {
      const kept = stored.get(one);
      if (kept === undefined) throw new Error(one);
      const changed = Uint8Array.from(kept.bytes);
      changed[0] = (changed[0] ?? 0) ^ 1;
      stored.set(one, { ...kept, bytes: changed });
      const replaced = await tampered(async () => undefined);
      expect(new Set(replaced.map(({ what }) => what))).toEqual(new Set([one]));
      expect(replaced[0]?.words).toMatch(/another/);
      stored.delete(one);
      expect(wheres(await tampered(async () => undefined))).toEqual(['objects']);
      stored.set(one, kept);
    }
    // The row that says where a photograph is kept is no part of the record; the documents name it.
    const faults = await tampered((em) => em.execute('delete from public.file'));
    expect(wheres(faults)).toEqual(['objects']);
    const originals = keys.filter((one) => one.startsWith('originals/'));
    expect(faults.map(({ what }) => `originals/${what}`).sort()).toEqual(originals.sort());
  });

  it('names an object of erased content that is still in the store, or was put back', async () => {
    const [erased] = await superuser.em.fork().execute<{ hash: string }[]>(
      `select jsonb_array_elements_text(c.content::jsonb -> 'files') as hash
       from record.ledger_content c where c.role = 'erasure'`,
    );
    const { stored } = record.objects;
    for (const key of [`originals/${erased?.hash}`, `previews/${erased?.hash}/640.jpg`]) {
      stored.set(key, { bytes: new Uint8Array([1]), type: 'image/jpeg' });
      expect(await tampered(async () => undefined)).toEqual([
        { where: 'objects', what: key, words: expect.stringMatching(/erased, and it is still/) },
      ]);
      stored.delete(key);
    }
  });

  it('takes no head of another key or series for one', async () => {
    const [receipt = ''] = receipts;
    const { key } = record.kept.get(nightId) ?? { key: '' };
    const asked = {
      seriesId: nightId,
      keys: [key],
      heads: [receipt.replace('tagwire', 'tagwiry')],
    };
    const { faults } = await auditLedger(record.ports(), asked);
    expect(faults.length).toBeGreaterThan(0);
  });
});
