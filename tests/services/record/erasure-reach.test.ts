import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Migration } from '@mikro-orm/migrations';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import type { Actor } from '@/domain/access/permission';
import { findPart } from '@/services/custody/find-part';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { eraseDayWords } from '@/services/ledger/erasure/erase-day-words';
import { eraseStrokes } from '@/services/ledger/erasure/erase-strokes';
import { liftHold } from '@/services/ledger/erasure/lift-hold';
import { listErasures } from '@/services/ledger/erasure/list-erasures';
import { listHolds } from '@/services/ledger/erasure/list-holds';
import { openErasure } from '@/services/ledger/erasure/open-erasure';
import { placeHold } from '@/services/ledger/erasure/place-hold';
import { reapplyErasures } from '@/services/ledger/erasure/reapply-erasures';
import { StrokesAndRetention } from '../../../migrations/0012-strokes-and-retention';
import { WordsThatCanGo } from '../../../migrations/0026-words-that-can-go';
import { connect, createDatabase, withDatabase } from '../../../scripts/postgres/roles.mjs';
import { makeBackup } from '../../../scripts/record/make-backup';
import { restoreBackup } from '../../../scripts/record/restore-backup';
import { failureOf, get } from '../../support/bay';
import { openRecordOfANight, type RecordOfANight } from '../../support/record-of-a-night';
import { recordThePaddock } from '../../support/record-of-a-paddock';

const REASON = 'The season’s retention time has passed.';
/** Words of the day that stand in the record before they are erased, and in nothing that is kept for good. */
const DAY = [
  'Nils Farrow',
  'The owner is ill',
  'Held up on the road',
  'A second measurement',
  'Beside the old one',
  'Asked for by the crew',
];
const BUCKET = {
  keys: async () => [],
  read: () => Promise.reject(new Error('There are no objects here.')),
  write: () => Promise.resolve(),
  close: () => undefined,
};

let record: RecordOfANight;
let folder: string;
const emptied: string[] = [];

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-reach-'));
  record = await openRecordOfANight();
  const { ownerUrl } = record.world.database;
  await makeBackup({ ownerUrl, bucket: BUCKET, folder: join(folder, 'older') });
});
afterAll(async () => {
  await record.world.close();
  const client = await connect(inject('cluster').superuserUrl);
  for (const name of emptied) await client.query(`drop database if exists "${name}" with (force)`);
  await client.end();
  rmSync(folder, { recursive: true, force: true });
});

const uuid = () => record.ports().random.uuid();

/** Tables of the record with a row in which the words stand. */
const tablesWith = async (words: string, url = record.world.database.superuserUrl) => {
  const client = await connect(url);
  try {
    const { rows } = await client.query<{ name: string }>(
      "select format('%I.%I', schemaname, tablename) as name from pg_tables where schemaname = 'record' order by 1",
    );
    const found: string[] = [];
    for (const { name } of rows) {
      const sql = `select 1 from ${name} t where position($1 in t::text) > 0 limit 1`;
      if ((await client.query(sql, [words])).rows.length > 0) found.push(name);
    }
    return found;
  } finally {
    await client.end();
  }
};

const faults = async (seriesId: string, ports = record.ports()) => {
  const heads = [record.kept.get(seriesId)?.last ?? ''];
  return (await auditLedger(ports, { seriesId, heads, keys: [] })).faults;
};

const erasePaperwork = (paperworkId: string, actor: Actor = record.paddock.official) => {
  const { seriesId } = record.paddock;
  return eraseContent(record.ports(), actor, {
    act: uuid(),
    seriesId,
    paperworkId,
    reason: REASON,
  });
};

const eraseDay = (of: { seriesId: string; eventId: string }, actor: Actor) =>
  eraseDayWords(record.ports(), actor, { act: uuid(), ...of, reason: REASON });

const night = () => ({ seriesId: record.night.seriesId, eventId: record.night.eventId });

describe('what stands beside paperwork', () => {
  it('goes with it: why it was taken back', async () => {
    const words = 'Joss Farrow bought car 31';
    expect(await tablesWith(words)).toEqual([
      'record.ledger_content',
      'record.paperwork_withdrawal',
    ]);
    expect(get(await erasePaperwork(record.left.takenBack))).toMatchObject({ contents: 2 });
    expect(await tablesWith(words)).toEqual([]);
    expect(await faults(record.paddock.seriesId)).toEqual([]);
  });

  it('goes with it: who signed for whom; that it was signed, how and when, stays', async () => {
    const guardian = async () => {
      const rows = await record
        .ports()
        .db.execute<{ guardian: string | null; method: string }[]>(
          'select guardian_id as guardian, method from record.guardian_signature where paperwork_id = ?',
          [record.left.signedFor],
        );
      return rows[0];
    };
    const before = await guardian();
    expect(await tablesWith(before?.guardian ?? 'nobody')).toContain('record.ledger_content');
    get(await erasePaperwork(record.left.signedFor));
    expect(await guardian()).toEqual({ guardian: null, method: before?.method });
    expect(await faults(record.paddock.seriesId)).toEqual([]);
  });

  it('goes where nothing was handed in yet: a swap’s engines and seal', async () => {
    const { swapped } = record.left;
    expect(await tablesWith('SPARE-2')).toEqual(['record.engine_swap', 'record.ledger_content']);
    const desk = get(await openErasure(record.ports(), record.paddock.official, swapped));
    expect(desk.contents.map(({ role }) => role)).toEqual(['swap']);
    expect(failureOf(await erasePaperwork(swapped, record.paddock.competitor)).name).toBe('absent');
    get(await erasePaperwork(swapped));
    expect(await tablesWith('SPARE-2')).toEqual([]);
    expect(await faults(record.paddock.seriesId)).toEqual([]);
    expect(failureOf(await erasePaperwork(swapped)).name).toBe('absent');
  });
});

describe('names and reasons of an event’s day', () => {
  it('are for the series’ officials to erase, with a reason', async () => {
    for (const actor of [record.night.competitor, record.night.inspector, record.paddock.official])
      expect(failureOf(await eraseDay(night(), actor)).name).toBe('absent');
    const asked = { act: uuid(), ...night(), reason: ' no ' };
    const refused = await eraseDayWords(record.ports(), record.night.official, asked);
    expect(failureOf(refused).faults?.[0]?.pointer).toBe('/reason');
    for (const words of DAY) expect(await tablesWith(words)).not.toEqual([]);
  });

  it('wait while a hold stands on an inspection there, and so do its pen strokes', async () => {
    const { seriesId } = night();
    const { official } = record.night;
    const [signed] = await record
      .ports()
      .db.execute<{ id: string }[]>(
        'select inspection_id as id from record.signature_strokes where series_id = ? and strokes is not null',
        [seriesId],
      );
    const inspectionId = signed?.id ?? '';
    const hold = { act: uuid(), id: uuid(), seriesId, inspectionId, reason: 'A protest is open.' };
    for (const other of [record.night.inspector, record.paddock.official])
      expect(failureOf(await placeHold(record.ports(), other, hold)).name).toBe('absent');
    const nowhere = { ...hold, act: uuid(), inspectionId: uuid() };
    expect(failureOf(await placeHold(record.ports(), official, nowhere)).name).toBe('absent');
    get(await placeHold(record.ports(), official, hold));
    expect(await listHolds(record.ports().db, seriesId, [inspectionId])).toMatchObject([
      { id: hold.id, kind: 'inspection', reason: 'A protest is open.' },
    ]);
    expect(failureOf(await eraseDay(night(), official)).detail).toContain('A hold stands');
    const strokes = { act: uuid(), seriesId, inspectionId, reason: REASON };
    const refused = failureOf(await eraseStrokes(record.ports(), official, strokes));
    expect(refused.detail).toContain('A hold stands');
    get(await liftHold(record.ports(), official, { act: uuid(), seriesId, holdId: hold.id }));
    for (const words of DAY) expect(await tablesWith(words)).not.toEqual([]);
  });

  it('are in no row of the record afterwards; that it happened stands, and the ledger verifies', async () => {
    const count = async () => {
      const rows = await record.ports().db.execute<{ n: string }[]>(
        `select (select count(*) from record.entry_change) || ' ' || (select count(*) from record.custody_act)
           || ' ' || (select count(*) from record.seal_act where number = '10441') as n`,
      );
      return rows[0]?.n;
    };
    const [part] = await record
      .ports()
      .db.execute<{ id: string }[]>('select id from record.held_part limit 1');
    const chain = async () => {
      const found = get(await findPart(record.ports(), record.night.official, part?.id ?? ''));
      return found.custody.gaps.map(({ after, before }) => [after, before]);
    };
    const [before, gaps] = [await count(), await chain()];
    expect(gaps).not.toEqual([]);
    const { contents } = get(await eraseDay(night(), record.night.official));
    expect(contents).toBeGreaterThan(6);
    for (const words of DAY) expect([words, await tablesWith(words)]).toEqual([words, []]);
    expect(await count()).toBe(before);
    // What did not follow in a chain of custody does not become whole by it.
    expect(await chain()).toEqual(gaps);
    expect(await faults(record.night.seriesId)).toEqual([]);
    const again = failureOf(await eraseDay(night(), record.night.official));
    expect(again.name).toBe('not-in-this-state');
  });

  it('are those of one event: who signed on elsewhere stays until that is erased', async () => {
    expect(await tablesWith('Edda Lindqvist')).toEqual([
      'record.bulletin_acknowledgement',
      'record.ledger_content',
    ]);
    const { seriesId, official } = record.paddock;
    get(await eraseDay({ seriesId, eventId: record.left.eventId }, official));
    expect(await tablesWith('Edda Lindqvist')).toEqual([]);
    expect(await faults(seriesId)).toEqual([]);
  });
});

describe('rows of before these columns could be erased', () => {
  const digestOf = (migration: Migration): string => {
    migration.up();
    const found = migration.getQueries().find((sql) => String(sql).includes('append.act_digest('));
    return String(found);
  };

  it('are held whole by the digest of then, can be erased alike, and the ledger verifies', async () => {
    const { seriesId } = record.paddock;
    const orm = await openDatabase(record.world.database.superuserUrl, 1);
    try {
      const [driver, config] = [orm.em.getDriver(), orm.config] as const;
      await orm.em.fork().execute(digestOf(new StrokesAndRetention(driver, config)));
      const engineId = await recordThePaddock(record.paddock).undeclared();
      const paperworkId = await recordThePaddock({ ...record.paddock, engineId }).takenBack('50');
      await orm.em.fork().execute(digestOf(new WordsThatCanGo(driver, config)));
      const [kept] = await record.ports().db.execute<{ columns: Record<string, string[]> }[]>(
        `select c.content::jsonb -> 'columns' as columns from record.ledger_line l
         join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
         where l.series_id = ? and l.kind = 'paperwork-withdrawn' and c.role = 'rows'
         order by l.index desc limit 1`,
        [seriesId],
      );
      expect(kept?.columns['paperwork_withdrawal']).toContain('reason');
      expect(await faults(seriesId)).toEqual([]);
      const words = 'Joss Farrow bought car 50';
      expect(await tablesWith(words)).not.toEqual([]);
      get(await erasePaperwork(paperworkId));
      expect(await tablesWith(words)).toEqual([]);
      expect(await faults(seriesId)).toEqual([]);
    } finally {
      await orm.close();
    }
  });
});

describe('after an older copy was restored', () => {
  it('all of it is erased again from the list, and the copy verifies', async () => {
    const cluster = inject('cluster');
    const name = `reach_${process.pid}`;
    const client = await connect(cluster.superuserUrl);
    await createDatabase(client, name);
    await client.end();
    emptied.push(name);
    const ownerUrl = withDatabase(cluster.ownerUrl, name);
    await restoreBackup({ ownerUrl, bucket: BUCKET, folder: join(folder, 'older') });
    const restored = withDatabase(cluster.superuserUrl, name);
    const words = [...DAY, 'Edda Lindqvist', 'SPARE-2', 'Joss Farrow bought car 31'];
    for (const one of words) expect(await tablesWith(one, restored)).not.toEqual([]);
    const orm = await openDatabase(withDatabase(cluster.appUrl, name), 2);
    try {
      const ports = () => ({ ...record.ports(), db: orm.em.fork() });
      const list = await listErasures(record.ports().db);
      const done = get(await reapplyErasures(ports(), list));
      expect(done.erased).toBe(5);
      expect(done.erased + done.nothingHere).toBe(list.length);
      for (const one of words) expect([one, await tablesWith(one, restored)]).toEqual([one, []]);
      for (const { seriesId } of [record.night, record.paddock])
        expect(
          (await faults(seriesId, ports())).filter(({ where }) => where !== 'objects'),
        ).toEqual([]);
    } finally {
      await orm.close();
    }
  });
});
