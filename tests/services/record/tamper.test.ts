import type { EntityManager, MikroORM } from '@mikro-orm/postgresql';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { signReport } from '@/services/inspection/report/sign-report';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import type { AuditFault } from '@/services/ledger/audit/fault';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { renderNotice } from '@/services/notice/render-notice';
import { publishVerdict } from '@/services/verdict/publish-verdict';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';
import {
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { FakeObjects } from '../../support/fakes';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { NO_BREACH } from '../../support/verdict-case';

let world: RecordWorld;
let night: RaceNight;
let superuser: MikroORM;
let key: string;
/** A signed head that somebody outside kept: the last before the tampering, and an early one. */
let receipt: string;
let early: string;
const objects = new FakeObjects();
const photograph = new TextEncoder().encode('a photograph of a tappet');

const uuid = () => world.ports().random.uuid();

const keepPhotograph = async (inspectionId: string): Promise<string> => {
  const id = uuid();
  const digest = sha256(photograph);
  const objectKey = `files/${toHex(digest)}`;
  await objects.write(objectKey, photograph, 'image/jpeg');
  await world.ports().db.execute(
    `insert into public.file (series_id, id, inspection_id, purpose, name, declared_type, declared_bytes,
       upload_key, state, object_key, media_type, bytes, sha256, created_by, created_at, kept_at)
     values (?, ?, ?, 'finding', 'bore.jpg', 'image/jpeg', ?, 'upload', 'kept', ?, 'image/jpeg', ?, ?, ?, now(), now())`,
    [
      night.seriesId,
      id,
      inspectionId,
      photograph.length,
      objectKey,
      photograph.length,
      Buffer.from(digest),
      night.inspector.personId,
    ],
  );
  return id;
};

const decide = async (inspectionId: string) => {
  const asked = { seriesId: night.seriesId, inspectionId };
  const draft = { act: uuid(), ...asked, version: null, content: NO_BREACH };
  const { version } = get(await saveVerdictDraft(world.ports(), night.official, draft));
  const publish = { act: uuid(), ...asked, version };
  const { verdictId } = get(await publishVerdict(world.ports(), night.official, publish));
  await renderNotice(world.ports(), { seriesId: night.seriesId, verdictId }, (line) =>
    proveForNotice(world.ports(), night.seriesId, line),
  );
};

beforeAll(async () => {
  world = await openRecordWorld({ objects, notices: noticePrinter });
  night = await openRaceNight(world);
  early = await signNow(world.ports(), night.seriesId);
  const inspectionId = await openInspection(world, night, '12J');
  const rows = rowsFor(world, night);
  const first = rows.fullBore('1');
  get(await send(world, night.inspector, inspectionId, first));
  const fileId = await keepPhotograph(inspectionId);
  const wrong = rows.reading({ value: { text: '0.8501', unit: 'in' } });
  get(
    await send(world, night.inspector, inspectionId, [
      wrong,
      rows.strike(wrong.id),
      {
        kind: 'remark',
        id: uuid(),
        occurredAt: '2026-07-12T03:20:00.000Z',
        place: { bank: 'left', cylinder: '1', valve: 'exhaust' },
        remark: 'photograph',
        subject: 'scored bore',
        value: fileId,
        reason: '',
      },
    ]),
  );
  const head = toHex((await fileOf(world, night.inspector, inspectionId)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  get(await signReport(world.ports(), inspector, { act: uuid(), inspectionId, head }));
  await decide(inspectionId);
  receipt = await signNow(world.ports(), night.seriesId);
  key = formatVerifierKey(world.keys.signer(night.seriesId).key);
  superuser = await openDatabase(world.database.superuserUrl, 2);
  // Whoever may do anything is not stopped by a constraint either.
  const { em } = superuser;
  const checks = await em.fork().execute<{ sql: string }[]>(
    `select format('alter table %s drop constraint %I', conrelid::regclass, conname) as sql
     from pg_constraint c join pg_namespace n on n.oid = c.connamespace
     where n.nspname = 'record' and c.contype = 'c'`,
  );
  for (const { sql } of checks) await em.fork().execute(sql);
});
afterAll(async () => {
  await superuser.close();
  await world.close();
});

class Undo extends Error {}

/** What the audit names after this was done by a superuser, which is then undone. */
const tampered = async (
  work: (em: EntityManager) => Promise<unknown>,
  heads: readonly string[] = [receipt],
): Promise<readonly AuditFault[]> => {
  let faults: readonly AuditFault[] = [];
  try {
    await superuser.em.fork().transactional(async (em) => {
      await em.execute('set local session_replication_role = replica');
      await work(em);
      const asked = { seriesId: night.seriesId, heads, keys: [key] };
      ({ faults } = await auditLedger({ db: em, objects }, asked));
      throw new Undo();
    });
  } catch (error) {
    if (!(error instanceof Undo)) throw error;
  }
  return faults;
};

const wheres = (faults: readonly AuditFault[]) => [...new Set(faults.map(({ where }) => where))];

/** Another value of the column's type; NULL is one too, where there was a value. */
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
  'timestamp with time zone': "coalesce(%c, now()) + interval '1 second'",
};

/**
 * The server's own notes of when something reached it, or that a gauge was overdue when it did.
 * They stand in nothing that was sent or signed; nothing is decided by them.
 */
const UNANCHORED = [
  'capture_batch.received_at',
  'checkpoint.signed_at',
  'ledger_line.appended_at',
  'reading.received_at',
  'reading.standing_reason',
  'remark.received_at',
  'remark.standing_reason',
  'rules.first_used_at',
  'zero.received_at',
  'zero.standing_reason',
];

/** Rows of the record by their place, without what could not be told from another row. */
const sampleOf = (table: string): string => {
  const own = `series_id = '${night.seriesId}'`;
  if (table === 'act')
    return `ctid = (select a.ctid from record.act a join record.ledger_line l on l.act_id = a.id
             where l.${own} and l.kind = 'report-signed' limit 1)`;
  if (table === 'checkpoint')
    return `ctid = (select max(ctid) from record.checkpoint where ${own})`;
  if (table === 'rules')
    return `ctid = (select ctid from record.rules r where ${own} and hash in (select rules_hash from record.report) limit 1)`;
  return `ctid = (select ctid from record."${table}" where ${own} order by ctid limit 1)`;
};

describe('an audit with a head that was issued before', () => {
  it('finds nothing where nothing was done', async () => {
    expect(await tampered(async () => undefined, [receipt, early])).toEqual([]);
    const asked = { seriesId: night.seriesId, heads: [receipt], keys: [key] };
    const audit = await auditLedger(world.ports(), asked);
    expect(audit.faults).toEqual([]);
    expect(audit.lines).toBeGreaterThan(5);
  });

  it('names the table of every column of every kind of row that is altered', async () => {
    const columns = await superuser.em
      .fork()
      .execute<{ table: string; column: string; type: string }[]>(
        `select c.relname as table, a.attname as column, format_type(a.atttypid, null) as type
       from pg_class c
       join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
       join pg_attribute a on a.attrelid = c.oid and a.attnum > 0 and not a.attisdropped
       where c.relkind = 'r' and c.relname <> 'schema_change' order by 1, a.attnum`,
      );
    const missed: string[] = [];
    const untouched = new Set<string>();
    let altered = 0;
    for (const { table, column, type } of columns) {
      const other = OTHER[type]?.replaceAll('%c', `"${column}"`);
      if (other === undefined) throw new Error(`no other value for the type ${type}`);
      let rows = 0;
      const faults = await tampered(async (em) => {
        const changed = await em.execute<unknown[]>(
          `update record."${table}" set "${column}" = ${other} where ${sampleOf(table)} returning 1`,
        );
        rows = changed.length;
      });
      if (rows === 0) untouched.add(table);
      else altered += 1;
      const named = wheres(faults).some((where) => where.split(' or ').includes(`record.${table}`));
      if (rows > 0 && !named) missed.push(`${table}.${column}`);
    }
    expect(missed.sort()).toEqual(UNANCHORED);
    const sampled = ['act', 'capture_batch', 'ledger_line', 'notice_pdf', 'reading', 'remark'];
    sampled.push('report', 'rule_publication', 'rules', 'verdict', 'zero');
    expect(sampled.filter((table) => untouched.has(table))).toEqual([]);
    expect(altered).toBeGreaterThan(120);
    console.info(
      `altered ${altered} columns, ${missed.length} of them not anchored; tables without a row here: ${[...untouched].join(', ')}`,
    );
  }, 240_000);

  it('names the table from which a row is deleted', async () => {
    const tables = [
      'act',
      'capture_batch',
      'checkpoint',
      'ledger_content',
      'ledger_head',
      'ledger_line',
      'ledger_node',
      'notice_pdf',
      'reading',
      'remark',
      'report',
      'rule_publication',
      'rules',
      'verdict',
      'zero',
    ];
    for (const table of tables) {
      const faults = await tampered((em) =>
        em.execute(`delete from record."${table}" where ${sampleOf(table)}`),
      );
      const named = wheres(faults).some((where) => where.includes(`record.${table}`));
      expect([table, named]).toEqual([table, true]);
    }
  });

  it('names a row that was put in, though every column is right for its place', async () => {
    for (const [table, change] of [
      ['reading', 'id = gen_random_uuid()'],
      ['zero', 'id = gen_random_uuid()'],
      ['remark', 'id = gen_random_uuid()'],
      ['capture_batch', 'number = number + 7'],
      ['report', 'revision = revision + 1'],
      ['rule_publication', 'id = gen_random_uuid(), number = number + 1'],
      ['verdict', "id = gen_random_uuid(), number = '2026-777', report_revision = 7"],
    ] as const) {
      const faults = await tampered(async (em) => {
        await em.execute(
          `create temp table put on commit drop as select * from record."${table}" where ${sampleOf(table)}`,
        );
        await em.execute(`update put set ${change}`);
        await em.execute(`insert into record."${table}" select * from put`);
      });
      expect([table, wheres(faults).join()]).toEqual([
        table,
        expect.stringContaining(`record.${table}`),
      ]);
    }
  });

  it('names lines that were swapped, though each is whole', async () => {
    const faults = await tampered(async (em) => {
      const at = `series_id = '${night.seriesId}' and index`;
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
      const own = `series_id = '${night.seriesId}'`;
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
          night.seriesId,
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
      const tail = `series_id = '${night.seriesId}' and`;
      await em.execute(`delete from record.ledger_content where ${tail} line_index >= 3`);
      await em.execute(`delete from record.ledger_line where ${tail} index >= 3`);
      await em.execute(`delete from record.ledger_node where ${tail} (index + 1) << level > 3`);
      await em.execute(`delete from record.checkpoint where ${tail} size > 3`);
      await em.execute(
        `update record.ledger_head set size = 3 where series_id = '${night.seriesId}'`,
      );
      for (const table of ['report', 'verdict', 'notice_pdf'])
        await em.execute(`delete from record."${table}"`);
    };
    const faults = await tampered(cut);
    expect(faults.map(({ words }) => words)).toEqual(
      expect.arrayContaining([expect.stringMatching(/of them are gone/)]),
    );
  });

  it('names an object that was replaced, changed or removed', async () => {
    const keys = [...objects.stored.keys()];
    expect(keys.some((one) => one.startsWith('notices/'))).toBe(true);
    expect(keys.some((one) => one.startsWith('files/'))).toBe(true);
    for (const one of keys) {
      const kept = objects.stored.get(one);
      if (kept === undefined) throw new Error(one);
      const changed = Uint8Array.from(kept.bytes);
      changed[0] = (changed[0] ?? 0) ^ 1;
      objects.stored.set(one, { ...kept, bytes: changed });
      expect(await tampered(async () => undefined)).toEqual([
        { where: 'objects', what: one, words: expect.stringMatching(/another/) },
      ]);
      objects.stored.delete(one);
      expect(wheres(await tampered(async () => undefined))).toEqual(['objects']);
      objects.stored.set(one, kept);
    }
    // The row that says where a photograph is kept is no part of the record; the report names it.
    const faults = await tampered((em) => em.execute('delete from public.file'));
    expect(wheres(faults)).toEqual(['objects']);
  });

  it('takes no head of another key or series for one', async () => {
    const asked = { seriesId: night.seriesId, heads: [receipt.replace('tagwire', 'tagwiry')] };
    const faults = (await auditLedger(world.ports(), { ...asked, keys: [key] })).faults;
    expect(faults.length).toBeGreaterThan(0);
  });
});
