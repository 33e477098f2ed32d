import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { openCheckpoint } from '@/domain/ledger/checkpoint';
import { saveGauge } from '@/services/gauge/save-gauge';
import { signCheckpoint } from '@/services/ledger/checkpoint/sign-checkpoint';
import { findLostHeads } from '@/services/ledger/restore/lost-heads';
import { recordRestore } from '@/services/ledger/restore/record-restore';
import type { Ports } from '@/services/ports';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { failureOf, gaugeFigures, get } from '../../support/bay';
import {
  openRecordWorld,
  type RecordWorld,
  signNow,
  sizeOf,
  writeLine,
} from '../../support/record';
import { addActor, addSeries } from '../../support/world';

let world: RecordWorld;
let admin: Actor;
let seriesId: string;
let count = 0;

beforeAll(async () => {
  world = await openRecordWorld();
  admin = await addActor(world, 'Administrator', [], true);
});
afterAll(() => world.close());
beforeEach(async () => {
  world.heads.notes.clear();
  count += 1;
  seriesId = await addSeries(world, `series-${count}`);
  for (let i = 0; i < 4; i++) get(await writeLine(world.ports(), seriesId, `car ${i}`));
});

/** As if an older copy of the database had been restored: the lines from `size` on are not there. */
const restoreTo = async (size: number) => {
  const client = await connect(world.database.superuserUrl);
  try {
    await client.query('set session_replication_role = replica');
    for (const sql of [
      'delete from record.ledger_content where series_id = $1 and line_index >= $2',
      'delete from record.ledger_line where series_id = $1 and index >= $2',
      'delete from record.ledger_node where series_id = $1 and (index + 1) << level > $2',
      'delete from record.checkpoint where series_id = $1 and size > $2',
      'update record.ledger_head set size = $2 where series_id = $1',
    ])
      await client.query(sql, [seriesId, size]);
  } finally {
    await client.end();
  }
};

const record = (
  ports: Ports,
  actor = admin,
  reason = 'The disk failed; Sunday’s copy was put back.',
) => recordRestore(ports, actor, { act: ports.random.uuid(), reason });

describe('a server whose database is behind its last signed head', () => {
  it('writes nothing, by any use case, until an administrator records the restore', async () => {
    const signed = sizeOf(await signNow(world.ports(), seriesId));
    await restoreTo(3);
    const server = world.newProcess();
    const refused = await writeLine(server(), seriesId, 'after');
    expect(failureOf(refused).name).toBe('read-only');
    const chief = await addActor(world, 'Perrin Oakhollow', [
      { seriesId, role: 'chief-inspector' },
    ]);
    const gauge = {
      act: server().random.uuid(),
      id: server().random.uuid(),
      seriesId,
      version: 0,
      code: 'MC-01',
      description: gaugeFigures.micrometer,
      status: 'in-use',
    } as const;
    expect(failureOf(await saveGauge(server(), chief, gauge)).name).toBe('read-only');
    expect(await findLostHeads(server())).toMatchObject([{ seriesId, size: signed, present: 3 }]);

    const official = await addActor(world, 'Ilse Törnkvist', [{ seriesId, role: 'official' }]);
    expect(failureOf(await record(server(), official)).name).toBe('absent');
    expect(failureOf(await record(server(), admin, 'short')).name).toBe('invalid');
    expect(get(await record(server()))).toEqual({ series: 1 });

    expect(get(await writeLine(server(), seriesId, 'after'))).toBe(4);
    expect((await saveGauge(server(), chief, gauge)).ok).toBe(true);
    const [line] = await server().db.execute<{ line: string; content: string }[]>(
      `select l.line, c.content from record.ledger_line l join record.ledger_content c
         on c.series_id = l.series_id and c.line_index = l.index and c.role = 'restore'
       where l.series_id = ? and l.kind = 'restore-recorded'`,
      [seriesId],
    );
    expect(JSON.parse(line?.line ?? '')).toMatchObject({
      index: '3',
      refs: { 'lost-size': String(signed) },
    });
    expect(JSON.parse(line?.content ?? '')).toMatchObject({ kept: '3', lostSize: String(signed) });
  });

  it('signs no other history by itself, though it was running all the while', async () => {
    await signNow(world.ports(), seriesId);
    const server = world.newProcess();
    get(await writeLine(server(), seriesId, 'running'));
    const before = await signNow(server(), seriesId);
    await restoreTo(2);
    // It has not looked since it began, so the act goes through; the head is what counts.
    get(await writeLine(server(), seriesId, 'into the gap'));
    await expect(signCheckpoint(server(), { seriesId })).rejects.toThrow(/lacks lines/);
    expect(failureOf(await writeLine(server(), seriesId, 'again')).name).toBe('read-only');
    get(await record(server()));
    const after = await signNow(server(), seriesId);
    const { key } = world.keys.signer(seriesId);
    expect(openCheckpoint(after, [key]).ok).toBe(true);
    expect(after).not.toBe(before);
    expect(await findLostHeads(server())).toEqual([]);
  });

  it('goes on in every process as soon as one of them has it on record', async () => {
    await signNow(world.ports(), seriesId);
    await restoreTo(1);
    const [one, other] = [world.newProcess(), world.newProcess()];
    expect((await writeLine(one(), seriesId, 'a')).ok).toBe(false);
    expect((await writeLine(other(), seriesId, 'b')).ok).toBe(false);
    get(await record(one()));
    expect((await writeLine(other(), seriesId, 'c')).ok).toBe(true);
  });

  it('is told apart from one that has another history of the same length', async () => {
    await signNow(world.ports(), seriesId);
    await restoreTo(2);
    for (let i = 0; i < 6; i++) get(await writeLine(world.ports(), seriesId, `other ${i}`));
    const server = world.newProcess();
    expect((await writeLine(server(), seriesId, 'more')).ok).toBe(false);
    get(await record(server()));
    expect((await writeLine(server(), seriesId, 'more')).ok).toBe(true);
  });

  it('does not know the series at all: its head is set aside, and others go on', async () => {
    const unknown = world.ports().random.uuid();
    world.heads.notes.set(
      unknown,
      (await signNow(world.ports(), seriesId)).replaceAll(seriesId, unknown),
    );
    const server = world.newProcess();
    expect((await writeLine(server(), seriesId, 'more')).ok).toBe(false);
    expect(get(await record(server()))).toEqual({ series: 0 });
    expect([...world.heads.notes.keys()]).toEqual([seriesId]);
    expect((await writeLine(server(), seriesId, 'more')).ok).toBe(true);
  });

  it('has nothing to record when nothing is lost', async () => {
    await signNow(world.ports(), seriesId);
    const server = world.newProcess();
    expect((await writeLine(server(), seriesId, 'more')).ok).toBe(true);
    expect(failureOf(await record(server())).name).toBe('not-in-this-state');
  });
});
