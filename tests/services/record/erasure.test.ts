import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { eraseContent } from '@/services/ledger/erasure/erase-content';
import { findErasure } from '@/services/ledger/erasure/find-erasure';
import { liftHold } from '@/services/ledger/erasure/lift-hold';
import { listErasures } from '@/services/ledger/erasure/list-erasures';
import { placeHold } from '@/services/ledger/erasure/place-hold';
import { reapplyErasures } from '@/services/ledger/erasure/reapply-erasures';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { openPaperworkToCheck } from '@/services/paperwork/read/open-paperwork-to-check';
import { openOwnVersion } from '@/services/paperwork/read/open-version';
import { connect, createDatabase, withDatabase } from '../../../scripts/postgres/roles.mjs';
import type { Bucket } from '../../../scripts/record/bucket';
import { makeBackup } from '../../../scripts/record/make-backup';
import { restoreBackup } from '../../../scripts/record/restore-backup';
import { failureOf } from '../../support/bay';
import { FakeObjects } from '../../support/fakes';
import {
  fullDraft,
  handIn,
  keepPhotograph,
  openPaddock,
  type Paddock,
  picture,
  save,
  start,
} from '../../support/paperwork';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { must } from '../rulebook/build';

const NOTE = 'Springs came from the blue van behind shed nine';
const VALUE = '0.84231';
const REMARK = 'The rack by the window is not legible';
const KEPT_REMARK = 'The third lifter lies under the glare';
const REASON = 'The season’s retention time has passed.';

let world: RecordWorld;
let paddock: Paddock;
let folder: string;
let paperworkId: string;
let other: string;
/** Never erased: for what is refused. */
let untouched: string;
let head: string;
const emptied: string[] = [];

const asBucket = (objects: FakeObjects): Bucket => ({
  keys: async () => [...objects.stored.keys()].sort(),
  read: async (key) => {
    const found = objects.stored.get(key);
    if (found === undefined) throw new Error(key);
    return found;
  },
  write: (key, bytes, type) => objects.write(key, bytes, type),
  close: () => undefined,
});

const written = async (carNumber: string, width: number): Promise<string> => {
  const id = await start(paddock, carNumber);
  await keepPhotograph(paddock, id, await picture(width));
  await keepPhotograph(paddock, id, await picture(222), 'second-view');
  const draft = { ...fullDraft({ '1 intake lifter': VALUE }), note: `${NOTE}, car ${carNumber}` };
  await handIn(paddock, id, await save(paddock, id, 1, draft));
  return id;
};

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-erasure-'));
  world = await openRecordWorld();
  paddock = await openPaddock(world);
  paperworkId = await written('12J', 301);
  other = await written('7', 302);
  untouched = await written('9', 303);
  for (const [id, text] of [
    [paperworkId, REMARK],
    [untouched, KEPT_REMARK],
  ] as const)
    must(
      await decidePaperwork(paddock.ports(), paddock.official, {
        act: paddock.uuid(),
        paperworkId: id,
        number: 1,
        decision: 'returned',
        remarks: [{ item: 'general', text }],
      }),
    );
  head = await signNow(paddock.ports(), paddock.seriesId);
  await makeBackup({
    ownerUrl: world.database.ownerUrl,
    bucket: asBucket(paddock.objects),
    folder: join(folder, 'older'),
  });
});
afterAll(async () => {
  await world.close();
  const client = await connect(inject('cluster').superuserUrl);
  for (const name of emptied) await client.query(`drop database if exists "${name}" with (force)`);
  await client.end();
  rmSync(folder, { recursive: true, force: true });
});

/** `public.mail` and so on: every table that has a row in which the words stand. */
const tablesWith = async (url: string, words: string): Promise<readonly string[]> => {
  const client = await connect(url);
  try {
    const { rows } = await client.query<{ name: string }>(
      `select format('%I.%I', schemaname, tablename) as name from pg_tables
       where schemaname in ('public', 'record', 'jobs') order by 1`,
    );
    const found: string[] = [];
    for (const { name } of rows) {
      const hit = await client.query(
        `select 1 from ${name} t where position($1 in t::text) > 0 limit 1`,
        [words],
      );
      if (hit.rows.length > 0) found.push(name);
    }
    return found;
  } finally {
    await client.end();
  }
};

const erase = (id: string, actor = paddock.official, act = paddock.uuid()) =>
  eraseContent(paddock.ports(), actor, {
    act,
    seriesId: paddock.seriesId,
    paperworkId: id,
    reason: REASON,
  });

const audit = (heads: readonly string[] = [head]) =>
  auditLedger(paddock.ports(), { seriesId: paddock.seriesId, heads, keys: [] });

const nameOf = (result: Parameters<typeof failureOf>[0]) => failureOf(result).name;

const mine = `${NOTE}, car 12J`;
const kept = `${NOTE}, car 9`;

describe('an erasure that must not be', () => {
  it('is refused to strangers and competitors as if it were not there, and without a reason', async () => {
    for (const actor of [paddock.stranger, paddock.competitor, paddock.rival])
      expect(nameOf(await erase(untouched, actor))).toBe('absent');
    const without = {
      act: paddock.uuid(),
      seriesId: paddock.seriesId,
      paperworkId: untouched,
      reason: ' no ',
    };
    expect(nameOf(await eraseContent(paddock.ports(), paddock.official, without))).toBe('invalid');
    expect(await tablesWith(world.database.superuserUrl, kept)).toEqual([
      'public.paperwork',
      'record.ledger_content',
      'record.paperwork_version',
    ]);
    expect(await tablesWith(world.database.superuserUrl, KEPT_REMARK)).toEqual([
      'public.mail',
      'record.ledger_content',
      'record.paperwork_decision',
    ]);
  });

  it('waits while a hold stands on the paperwork or the series', async () => {
    const { seriesId } = paddock;
    for (const held of [untouched, undefined]) {
      const id = paddock.uuid();
      const hold = {
        act: paddock.uuid(),
        id,
        seriesId,
        paperworkId: held,
        reason: 'A protest is open.',
      };
      expect(nameOf(await placeHold(paddock.ports(), paddock.stranger, hold))).toBe('absent');
      must(await placeHold(paddock.ports(), paddock.official, hold));
      const refused = await erase(untouched);
      expect(refused).toMatchObject({ ok: false, failure: { name: 'not-in-this-state' } });
      const lift = { act: paddock.uuid(), seriesId, holdId: id };
      expect(nameOf(await liftHold(paddock.ports(), paddock.rival, lift))).toBe('absent');
      must(await liftHold(paddock.ports(), paddock.official, lift));
    }
    expect(await tablesWith(world.database.superuserUrl, kept)).not.toEqual([]);
  });

  it('cannot be done past the services: not without an act, a line that says so, or under a hold', async () => {
    const { db } = paddock.ports();
    const [row] = await db.execute<{ index: string; act: string }[]>(
      `select index, act_id as act from record.ledger_line
       where series_id = ? and kind = 'paperwork-handed-in'
         and line::jsonb #>> '{refs,paperwork}' = ?`,
      [paddock.seriesId, untouched],
    );
    const attempt = (prepare: readonly string[]) =>
      db.fork().transactional(async (em) => {
        const act = paddock.uuid();
        await em.execute('select append.claim_act(?, ?, null, ?, ?)', [
          act,
          paddock.seriesId,
          'by-hand',
          Buffer.alloc(32),
        ]);
        for (const sql of prepare) await em.execute(sql);
        const erasure = { series_id: paddock.seriesId, line_index: row?.index, role: 'paperwork' };
        await em.execute('select append.erasure(?::jsonb)', [
          JSON.stringify([{ ...erasure, paperwork_id: untouched, act_id: act }]),
        ]);
      });
    await expect(attempt([])).rejects.toThrow(/no line of act/);
    const hold = `insert into public.hold (series_id, id, subject_kind, subject_id, reason, placed_by, since)
      values ('${paddock.seriesId}', gen_random_uuid(), 'paperwork', '${untouched}', 'x', '${paddock.official.personId}', now())`;
    await expect(attempt([hold])).rejects.toThrow(/a hold stands/);
    const foreign = [
      {
        series_id: paddock.seriesId,
        line_index: row?.index,
        role: 'paperwork',
        paperwork_id: untouched,
        act_id: row?.act,
      },
    ];
    await expect(
      db.fork().execute('select append.erasure(?::jsonb)', [JSON.stringify(foreign)]),
    ).rejects.toThrow(/was not claimed/);
    expect(await tablesWith(world.database.superuserUrl, kept)).toContain('record.ledger_content');
  });
});

describe('once a paperwork’s content was erased', () => {
  let before: number;
  let stored: number;
  let first: unknown;
  const act = '01980000-0000-7000-8000-00000000e7a5';

  beforeAll(async () => {
    before = (await audit()).lines;
    stored = paddock.objects.stored.size;
    first = must(await erase(paperworkId, paddock.official, act));
    await removeObjects(paddock.ports(), { seriesId: paddock.seriesId });
  });

  it('it was erased once: asked again, the answer is the first one', async () => {
    expect(first).toEqual({ contents: 2, files: 1 });
    expect(must(await erase(paperworkId, paddock.official, act))).toEqual(first);
    expect(nameOf(await erase(paperworkId))).toBe('not-in-this-state');
  });

  it('it is in no table and not in the object store, and the ledger verifies', async () => {
    expect(await tablesWith(world.database.superuserUrl, mine)).toEqual([]);
    expect(await tablesWith(world.database.superuserUrl, REMARK)).toEqual([]);
    // The other car's paperwork says the same value and keeps it; of the shared picture, too, one copy stays.
    expect(await tablesWith(world.database.superuserUrl, `${NOTE}, car 7`)).not.toEqual([]);
    expect(paddock.objects.stored.size).toBe(stored - 1);

    const after = await audit();
    expect(after.faults).toEqual([]);
    expect(after.lines).toBe(before + 1);
    await signNow(paddock.ports(), paddock.seriesId);
    expect((await audit()).faults).toEqual([]);
  });

  it('there is a page left that says when and why, to the owner and the officials alone', async () => {
    const { ports, competitor, official, rival, stranger } = paddock;
    for (const actor of [competitor, official])
      expect(await findErasure(ports(), actor, paperworkId)).toMatchObject({
        reason: REASON,
        erasedAt: world.clock.now().toISOString(),
      });
    for (const actor of [rival, stranger])
      expect(await findErasure(ports(), actor, paperworkId)).toBeUndefined();
    expect(await findErasure(ports(), competitor, other)).toBeUndefined();
    const asked = { paperworkId, number: 1 };
    expect(nameOf(await openOwnVersion(ports(), competitor, asked))).toBe('absent');
    expect(nameOf(await openPaperworkToCheck(ports(), official, asked))).toBe('absent');
  });

  it('it is erased again from the list after an older copy was restored, once, and the copy verifies', async () => {
    const list = await listErasures(paddock.ports().db, paddock.seriesId);
    expect(list).toHaveLength(1);
    const cluster = inject('cluster');
    const name = `older_${process.pid}`;
    const client = await connect(cluster.superuserUrl);
    await createDatabase(client, name);
    await client.end();
    emptied.push(name);
    const objects = new FakeObjects();
    await restoreBackup({
      ownerUrl: withDatabase(cluster.ownerUrl, name),
      bucket: asBucket(objects),
      folder: join(folder, 'older'),
    });
    const restored = withDatabase(cluster.superuserUrl, name);
    expect(await tablesWith(restored, mine)).not.toEqual([]);
    expect(objects.stored.size).toBe(stored);

    const orm = await openDatabase(withDatabase(cluster.appUrl, name), 2);
    try {
      const ports = () => ({ ...paddock.ports(), db: orm.em.fork(), objects });
      const forged = list.map((one) => ({
        ...one,
        document: one.document.replace('retention', 'x'),
      }));
      expect(nameOf(await reapplyErasures(ports(), forged))).toBe('invalid');
      expect(must(await reapplyErasures(ports(), list))).toEqual({ erased: 1, nothingHere: 0 });
      expect(must(await reapplyErasures(ports(), list))).toEqual({ erased: 0, nothingHere: 1 });
      await removeObjects(ports(), { seriesId: paddock.seriesId });
      expect(await tablesWith(restored, mine)).toEqual([]);
      expect(await tablesWith(restored, REMARK)).toEqual([]);
      expect([...objects.stored.keys()].sort()).toEqual([...paddock.objects.stored.keys()].sort());
      const asked = { seriesId: paddock.seriesId, heads: [head], keys: [] };
      expect((await auditLedger(ports(), asked)).faults).toEqual([]);
    } finally {
      await orm.close();
    }
  });
});
