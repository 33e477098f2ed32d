import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { toHex } from '@/domain/ledger/bytes';
import { openCheckpoint, signCheckpoint as signHead } from '@/domain/ledger/checkpoint';
import { lineLeaf } from '@/domain/ledger/line';
import {
  formatVerifierKey,
  parseVerifierKey,
  type VerifierKey,
} from '@/domain/ledger/note/verifier-key';
import { frontierOf, rootOf } from '@/domain/ledger/tree';
import { checkExtension, checkLine } from '@/domain/ledger/verify/check-line';
import { followKeys } from '@/domain/ledger/verify/follow-keys';
import { conclude } from '@/domain/ledger/verify/step';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { publishKey } from '@/services/ledger/checkpoint/published-key';
import { signCheckpoint } from '@/services/ledger/checkpoint/sign-checkpoint';
import { readRoot } from '@/services/ledger/nodes';
import { findSeriesKeys } from '@/services/ledger/proof/list-keys';
import { proveExtension, proveLine } from '@/services/ledger/proof/prove-line';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { failureOf, get } from '../../support/bay';
import { FakeObjects } from '../../support/fakes';
import {
  openRecordWorld,
  type RecordWorld,
  signNow,
  sizeOf,
  writeLine,
} from '../../support/record';
import { addSeries } from '../../support/world';

let world: RecordWorld;
let seriesId: string;
let series = 0;

beforeAll(async () => {
  world = await openRecordWorld();
});
afterAll(() => world.close());
beforeEach(async () => {
  series += 1;
  seriesId = await addSeries(world, `series-${series}`);
  world.keys.current = 'first';
  delete world.keys.previous;
});

const keyOf = (label: string): VerifierKey => {
  const before = world.keys.current;
  world.keys.current = label;
  const { key } = world.keys.signer(seriesId);
  world.keys.current = before;
  return key;
};

const write = async (count: number) => {
  for (let i = 0; i < count; i++) get(await writeLine(world.ports(), seriesId, `car ${i}`));
};

const notes = () =>
  world
    .ports()
    .db.execute<{ note: string }[]>(
      'select note from record.checkpoint where series_id = ? order by size',
      [seriesId],
    );

describe('signing the head of a ledger', () => {
  it('publishes the key in the first line it needs and signs the root of all lines', async () => {
    await write(3);
    const note = await signNow(world.ports(), seriesId);
    const opened = openCheckpoint(note, [keyOf('first')]);
    expect(opened.ok && opened.value.size).toBe(4);
    const { db } = world.ports();
    const lines = await db.execute<{ line: string; kind: string }[]>(
      'select line, kind from record.ledger_line where series_id = ? order by index',
      [seriesId],
    );
    expect(lines.map(({ kind }) => kind).at(-1)).toBe('key-published');
    const root = rootOf(frontierOf(lines.map(({ line }) => lineLeaf(line))));
    expect(opened.ok && toHex(opened.value.root)).toBe(toHex(root));
    expect(world.heads.notes.get(seriesId)).toBe(note);
  });

  it('says in the note when it was signed, and stores no other time', async () => {
    await write(2);
    world.clock.set('2026-07-11T21:00:00.125Z');
    const note = await signNow(world.ports(), seriesId);
    const opened = openCheckpoint(note, [keyOf('first')]);
    expect(opened.ok && opened.value.signedAt).toBe('2026-07-11T21:00:00.125Z');
    const [row] = await world
      .ports()
      .db.execute<{ at: Date }[]>('select signed_at as at from record.checkpoint where note = ?', [
        note,
      ]);
    expect(new Date(row?.at ?? 0).toISOString()).toBe('2026-07-11T21:00:00.125Z');
  });

  it('gives a head that was signed before out again, though its row was lost', async () => {
    await write(2);
    const note = await signNow(world.ports(), seriesId);
    const superuser = await connect(world.database.superuserUrl);
    await superuser.query('delete from record.checkpoint where series_id = $1', [seriesId]);
    await superuser.end();
    world.clock.advance(60_000);
    expect(await signNow(world.ports(), seriesId)).toBe(note);
  });

  it('keeps heads of before they said when: stored, audited and proved under as ever', async () => {
    await write(2);
    await publishKey(world.ports(), seriesId);
    const { db } = world.ports();
    const signer = world.keys.signer(seriesId);
    const head = { origin: signer.key.name, size: 3, root: await readRoot(db, seriesId, 3) };
    const old = await signHead(head, [signer]);
    await db.execute('select append.checkpoint(?, ?, ?)', [seriesId, 3, old]);
    await write(1);
    await signNow(world.ports(), seriesId);
    const asked = { seriesId, heads: [old], keys: [formatVerifierKey(signer.key)] };
    const objects = new FakeObjects();
    expect((await auditLedger({ ...world.ports(), objects }, asked)).faults).toEqual([]);
    const proof = get(await proveLine(world.ports(), { seriesId, index: 1, size: 3 }));
    expect(proof.checkpoint).toBe(old);
    expect(conclude(checkLine(proof, [signer.key]).steps)).toBe('passed');
  });

  it('signs one head for a burst, whichever of several workers comes first', async () => {
    await write(5);
    const workers = [world.newProcess(), world.newProcess(), world.newProcess()];
    await Promise.all(
      workers.flatMap((ports) => [1, 2].map(() => signCheckpoint(ports(), { seriesId }))),
    );
    expect(await notes()).toHaveLength(1);
    const published = await world
      .ports()
      .db.execute(
        "select 1 from record.ledger_line where series_id = ? and kind = 'key-published'",
        [seriesId],
      );
    expect(published).toHaveLength(1);
    await signCheckpoint(world.ports(), { seriesId });
    expect(await notes()).toHaveLength(1);
  });

  it('is done by the job that each line sends', async () => {
    await write(1);
    const jobs = await world
      .ports()
      .db.execute<{ data: { seriesId: string } }[]>(
        "select data from jobs.job where name = 'sign-checkpoint' and data ->> 'seriesId' = ?",
        [seriesId],
      );
    expect(jobs).toHaveLength(1);
  });

  it('cannot be talked into a head that is not true, nor into a second one of the same size', async () => {
    await write(3);
    const note = await signNow(world.ports(), seriesId);
    const app = await connect(world.database.appUrl);
    const store = (size: number, text: string) =>
      app.query<{ stored: boolean }>('select append.checkpoint($1, $2, $3) as stored', [
        seriesId,
        size,
        text,
      ]);
    try {
      await expect(store(5, note)).rejects.toMatchObject({ code: '22023' });
      await expect(store(3, note)).rejects.toMatchObject({ code: '22023' });
      await expect(store(0, note)).rejects.toMatchObject({ code: '22023' });
      const otherRoot = note.replace(/\n4\n./, (head) => `${head.slice(0, -1)}=`);
      await expect(store(4, otherRoot)).rejects.toMatchObject({ code: '22023' });
      const otherSeries = note.replace(seriesId, seriesId.replace(/.$/, 'x'));
      await expect(store(4, otherSeries)).rejects.toMatchObject({ code: '22023' });
      const again = await store(4, note);
      expect(again.rows).toEqual([{ stored: false }]);
    } finally {
      await app.end();
    }
    expect(await notes()).toEqual([{ note }]);
  });
});

describe('proofs from the kept subtrees', () => {
  it('lead every line to every signed head that covers it, and every head to a later one', async () => {
    const heads: string[] = [];
    for (const count of [1, 2, 3, 7]) {
      await write(count);
      heads.push(await signNow(world.ports(), seriesId));
    }
    const key = keyOf('first');
    let checked = 0;
    for (const head of heads) {
      const size = sizeOf(head);
      for (let index = 0; index < size; index++) {
        const proof = get(await proveLine(world.ports(), { seriesId, index, size }));
        expect(conclude(checkLine(proof, [key]).steps), `line ${index} of ${size}`).toBe('passed');
        checked += 1;
      }
    }
    expect(checked).toBe(heads.reduce((sum, head) => sum + sizeOf(head), 0));
    for (const older of heads) {
      const opened = openCheckpoint(older, [key]);
      if (!opened.ok) throw new Error(opened.failure.detail);
      for (const newer of heads.filter((head) => sizeOf(head) >= sizeOf(older))) {
        const asked = { seriesId, from: sizeOf(older), to: sizeOf(newer) };
        const extension = get(await proveExtension(world.ports(), asked));
        expect(checkExtension(opened.value, extension, [key]).outcome).toBe('passed');
      }
    }
  });

  it('are refused for lines and sizes that no signed head covers', async () => {
    await write(2);
    const size = sizeOf(await signNow(world.ports(), seriesId));
    await write(1);
    const ports = world.ports();
    expect(failureOf(await proveLine(ports, { seriesId, index: size })).name).toBe('invalid');
    expect(failureOf(await proveLine(ports, { seriesId, index: 0, size: 2 })).name).toBe('absent');
    expect(failureOf(await proveExtension(ports, { seriesId, from: size + 1 })).name).toBe(
      'invalid',
    );
    expect(failureOf(await proveExtension(ports, { seriesId, from: 0 })).name).toBe('invalid');
  });
});

describe('handing over to a new key', () => {
  it('is a line under a head that the older key signed; a reader of the older key follows', async () => {
    await write(2);
    await signNow(world.ports(), seriesId);
    world.keys.current = 'second';
    world.keys.previous = 'first';
    const handOver = await signNow(world.ports(), seriesId);
    for (const label of ['first', 'second'])
      expect(openCheckpoint(handOver, [keyOf(label)]).ok, label).toBe(true);
    delete world.keys.previous;
    await write(1);
    const after = await signNow(world.ports(), seriesId);
    expect(openCheckpoint(after, [keyOf('first')]).ok).toBe(false);
    const keys = await findSeriesKeys(world.ports(), seriesId);
    expect(keys?.published).toHaveLength(2);
    const followed = followKeys([keyOf('first')], keys?.published.slice(1) ?? []);
    expect(conclude(followed.steps)).toBe('passed');
    expect(followed.keys.map(formatVerifierKey)).toEqual(
      ['first', 'second'].map((label) => formatVerifierKey(keyOf(label))),
    );
    expect(openCheckpoint(after, followed.keys).ok).toBe(true);
    expect(keys?.current).toBe(formatVerifierKey(keyOf('second')));
    expect(parseVerifierKey(keys?.current ?? '').ok).toBe(true);
  });

  it('does not happen without the older key: nothing is signed with a key out of nowhere', async () => {
    await write(1);
    await signNow(world.ports(), seriesId);
    world.keys.current = 'stranger';
    await write(1);
    await expect(signCheckpoint(world.ports(), { seriesId })).rejects.toThrow(/another key/);
    world.keys.previous = 'another stranger';
    await expect(signCheckpoint(world.ports(), { seriesId })).rejects.toThrow(/another key/);
    expect(await notes()).toHaveLength(1);
  });
});
