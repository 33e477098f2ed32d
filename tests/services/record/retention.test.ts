import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { liftHold } from '@/services/ledger/erasure/lift-hold';
import { placeHold } from '@/services/ledger/erasure/place-hold';
import { removeObjects } from '@/services/ledger/erasure/remove-objects';
import { eraseDue } from '@/services/ledger/retention/erase-due';
import { findRetention } from '@/services/ledger/retention/find-retention';
import { saveRetention } from '@/services/ledger/retention/save-retention';
import { failureOf, get } from '../../support/bay';
import { signNow } from '../../support/record';
import { openRecordOfANight, type RecordOfANight } from '../../support/record-of-a-night';

const SEASON_END = '2027-01-01T05:59:00.000Z';
const AFTER = '2027-01-01T06:01:00.000Z';

let record: RecordOfANight;
beforeAll(async () => {
  record = await openRecordOfANight();
});
afterAll(() => record.world.close());
beforeEach(() => record.ports().db.execute('delete from public.retention'));

const uuid = () => record.ports().random.uuid();
/** The official of a series, and its id: the one with paperwork, or the one with inspections. */
const paddock = () => ({ seriesId: record.paddock.seriesId, official: record.paddock.official });
const night = () => ({ seriesId: record.night.seriesId, official: record.night.official });

const set = (
  { seriesId, official }: ReturnType<typeof paddock>,
  to: 'keep' | 'season-end',
  version: number,
) =>
  saveRetention(record.ports(), official, {
    act: uuid(),
    seriesId,
    version,
    uninspectedPaperwork: to,
    penStrokes: to,
    dayWords: to,
  });
const look = async ({ seriesId, official }: ReturnType<typeof paddock>) =>
  get(await findRetention(record.ports(), official, seriesId));
const dueOf = async (of: ReturnType<typeof paddock>, kind: string) =>
  (await look(of)).due.filter((one) => one.kind === kind);
const carDue = async (carNumber: string) =>
  (await dueOf(paddock(), 'paperwork')).filter((one) => one.carNumber === carNumber);
const erase = (
  { seriesId, official }: ReturnType<typeof paddock>,
  confirmed: readonly string[],
  act = uuid(),
) => eraseDue(record.ports(), official, { act, seriesId, confirmed });

const faults = async (seriesId: string) => {
  const head = await signNow(record.ports(), seriesId);
  return (await auditLedger(record.ports(), { seriesId, heads: [head], keys: [] })).faults;
};

describe('retention', () => {
  it('keeps everything for good where a series has set nothing, however long ago it was', async () => {
    record.world.clock.set('2040-01-01T00:00:00.000Z');
    const found = await look(paddock());
    expect(found).toEqual({
      set: { uninspectedPaperwork: 'keep', penStrokes: 'keep', dayWords: 'keep', version: 0 },
      due: [],
    });
  });

  it('is set by officials of the series alone, and not over what another has set meanwhile', async () => {
    const { seriesId } = paddock();
    for (const actor of [record.paddock.competitor, record.night.official]) {
      const refused = await set({ seriesId, official: actor }, 'season-end', 0);
      expect(failureOf(refused).name).toBe('absent');
      expect(failureOf(await findRetention(record.ports(), actor, seriesId)).name).toBe('absent');
      expect(failureOf(await erase({ seriesId, official: actor }, [])).name).toBe('absent');
    }
    expect(get(await set(paddock(), 'season-end', 0))).toMatchObject({ version: 1 });
    expect(failureOf(await set(paddock(), 'keep', 0)).name).toBe('stale');
    expect(get(await set(paddock(), 'keep', 1))).toMatchObject({ version: 2 });
    expect(failureOf(await set(paddock(), 'season-end', 1)).name).toBe('stale');
  });

  it('lists uninspected paperwork once the season is over by the series’ clocks, and erases what was confirmed', async () => {
    get(await set(paddock(), 'season-end', 0));
    record.world.clock.set(SEASON_END);
    expect((await look(paddock())).due).toEqual([]);
    record.world.clock.set(AFTER);
    // Of each kind of two that were handed in, one was erased before.
    const cars = (await dueOf(paddock(), 'paperwork')).map(({ carNumber }) => carNumber);
    expect(cars.sort()).toEqual(['20', '21', '31', '41', '7']);
    const [one] = await carDue('7');
    expect(one).toMatchObject({ season: '2026', endedOn: '2026-12-31', held: null });
    if (one === undefined) throw new Error('nothing is due');

    const { seriesId, official } = paddock();
    const hold = { act: uuid(), id: uuid(), seriesId, paperworkId: one.id };
    const reason = 'A protest is open.';
    get(await placeHold(record.ports(), official, { ...hold, reason }));
    expect(await carDue('7')).toMatchObject([{ id: one.id, held: reason }]);
    expect(get(await erase(paddock(), [one.id]))).toEqual({ erased: 0, left: 1 });
    get(await liftHold(record.ports(), official, { act: uuid(), seriesId, holdId: hold.id }));

    expect(get(await erase(paddock(), []))).toEqual({ erased: 0, left: 0 });
    expect(await carDue('7')).toHaveLength(1);
    const act = uuid();
    expect(get(await erase(paddock(), [one.id, uuid()], act))).toEqual({ erased: 1, left: 1 });
    expect(await carDue('7')).toEqual([]);
    await removeObjects(record.ports(), { seriesId });
    expect(await faults(seriesId)).toEqual([]);
    const [line] = await record.ports().db.execute<{ content: string }[]>(
      `select content from record.ledger_content
       where series_id = ? and role = 'erasure' order by line_index desc limit 1`,
      [seriesId],
    );
    expect(JSON.parse(line?.content ?? '')).toMatchObject({
      reason: 'Kept to the end of season 2026, as the series has set: it ended on 2026-12-31.',
    });
  });

  it('lists pen strokes of inspections, whose reports and signatures stay', async () => {
    record.world.clock.set(AFTER);
    get(await set(night(), 'season-end', 0));
    const due = await dueOf(night(), 'inspection');
    expect(due).toMatchObject([{ carNumber: '12J', held: null }]);
    const confirmed = due.map(({ id }) => id);
    expect(get(await erase(night(), confirmed))).toEqual({ erased: 1, left: 0 });
    expect(await dueOf(night(), 'inspection')).toEqual([]);
    const { seriesId } = night();
    expect(await faults(seriesId)).toEqual([]);
    const reports = await record
      .ports()
      .db.execute<unknown[]>('select 1 from record.report where series_id = ?', [seriesId]);
    expect(reports).toHaveLength(2);
  });

  it('lists an event whose names and reasons stand, and keeps it while its inspection is held', async () => {
    record.world.clock.set(AFTER);
    get(await set(night(), 'season-end', 0));
    const { seriesId, official } = night();
    const [event] = await dueOf(night(), 'event');
    expect(event).toMatchObject({ id: record.night.eventId, carNumber: '', held: null });
    const [inspection] = await record
      .ports()
      .db.execute<{ id: string }[]>(
        'select id from public.inspection where series_id = ? and event_id = ? limit 1',
        [seriesId, record.night.eventId],
      );
    const hold = { act: uuid(), id: uuid(), seriesId, inspectionId: inspection?.id };
    const reason = 'A protest is open.';
    get(await placeHold(record.ports(), official, { ...hold, reason }));
    expect(await dueOf(night(), 'event')).toMatchObject([{ held: reason }]);
    expect(get(await erase(night(), [record.night.eventId]))).toEqual({ erased: 0, left: 1 });
    get(await liftHold(record.ports(), official, { act: uuid(), seriesId, holdId: hold.id }));
    expect(get(await erase(night(), [record.night.eventId]))).toEqual({ erased: 1, left: 0 });
    expect(await dueOf(night(), 'event')).toEqual([]);
    expect(await faults(seriesId)).toEqual([]);
  });
});
