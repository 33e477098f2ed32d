import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { toHex } from '@/domain/ledger/bytes';
import { assignInspector } from '@/services/inspection/assign-inspector';
import { changeState } from '@/services/inspection/change-state';
import { readHistory } from '@/services/inspection/read/history';
import { readReports } from '@/services/inspection/report/read-reports';
import { reviseReport } from '@/services/inspection/report/revise-report';
import { signReport } from '@/services/inspection/report/sign-report';
import {
  failureOf,
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const uuid = () => world.ports().random.uuid();
const fresh = (actor = night.inspector) => ({
  ...actor,
  authenticatedAt: world.clock.now().toISOString(),
});
const headOf = async (id: string) => toHex((await fileOf(world, night.inspector, id)).chain.head);
const sign = async (id: string, actor = fresh(), head?: string) =>
  signReport(world.ports(), actor, {
    act: uuid(),
    inspectionId: id,
    head: head ?? (await headOf(id)),
  });
const reportsOf = (id: string) => readReports(world.ports().db, night.seriesId, id);

const measured = async (carNumber: string) => {
  const id = await openInspection(world, night, carNumber);
  const rows = rowsFor(world, night);
  get(await send(world, night.inspector, id, rows.fullBore()));
  return { id, ...rows };
};

describe('signing', () => {
  it('needs a sign-in of the last quarter of an hour', async () => {
    const { id } = await measured('1');
    const stale = new Date(world.clock.now().getTime() - 16 * 60_000).toISOString();
    const tried = await sign(id, { ...night.inspector, authenticatedAt: stale });
    expect(failureOf(tried).name).toBe('fresh-sign-in-required');
    expect(await reportsOf(id)).toEqual([]);
  });

  it('is refused when something came in since the signer looked', async () => {
    const { id, reading } = await measured('2');
    const head = await headOf(id);
    get(await send(world, night.chief, id, [reading({})]));
    expect(failureOf(await sign(id, fresh(), head)).name).toBe('stale');
  });

  it('closes the inspection over a document that holds every row, with the chain’s head in its line', async () => {
    const { id, reading, strike } = await measured('3');
    const wrong = reading({ value: { text: '0.8243', unit: 'in' } });
    get(await send(world, night.inspector, id, [wrong, strike(wrong.id)]));
    const head = await headOf(id);
    const signed = get(await sign(id));
    expect(signed.revision).toBe(1);
    const [report] = await reportsOf(id);
    const document = JSON.parse(report?.document ?? '');
    expect(report).toMatchObject({ hash: signed.hash, chainHead: head, signer: 'Oona Brannick' });
    expect(document).toMatchObject({
      document: 'tagwire/report',
      chainHead: head,
      zone: 'America/Chicago',
      witness: { outcome: 'absent' },
      revision: { number: '1' },
    });
    expect(document.readings).toHaveLength(6);
    expect(
      document.readings.find((row: { row: { id: string } }) => row.row.id === wrong.id),
    ).toMatchObject({ state: 'struck', reason: 'wrong-value' });
    expect(document.zeros).toHaveLength(2);
    expect(document.gauges.map((gauge: { code: string }) => gauge.code).sort()).toEqual([
      'DB-07',
      'MC-01',
      'SR-03',
    ]);
    const [line] = await world.ports().db.execute<{ line: string }[]>(
      `select line from record.ledger_line where kind = 'report-signed'
       and line::jsonb #>> '{refs,inspection}' = ?`,
      [id],
    );
    expect(JSON.parse(line?.line ?? '').refs).toMatchObject({ chain: head, revision: '1' });
    expect((await fileOf(world, night.inspector, id)).inspection.state).toBe('closed');
  });

  it('is not for anybody else, and nobody signs what they have an interest in', async () => {
    const { id } = await measured('4');
    const other = await addActor(world, 'Wim Aldergate', [
      { seriesId: night.seriesId, role: 'inspector' },
    ]);
    for (const actor of [other, night.official, night.competitor])
      expect(failureOf(await sign(id, fresh(actor))).name).toBe('absent');
    const racingChief = fresh({
      ...night.competitor,
      standings: [{ seriesId: night.seriesId, role: 'chief-inspector' }],
    });
    await world
      .ports()
      .db.execute('update public.entry set competitor_id = ? where car_number = ?', [
        night.competitor.personId,
        '4',
      ]);
    expect(failureOf(await sign(id, racingChief)).name).toBe('conflict-of-interest');
  });
});

describe('after signing', () => {
  it('what arrives is kept as received and changes no report', async () => {
    const { id, reading } = await measured('5');
    get(await sign(id));
    const before = await reportsOf(id);
    const late = get(await send(world, night.inspector, id, [reading({})]));
    expect(late.received[0]?.reason).toBe('This arrived after the report was signed.');
    expect(await reportsOf(id)).toEqual(before);
  });

  it('a correction needs its reason, and becomes a revision beside the first', async () => {
    const { id, strike, reading } = await measured('6');
    const first = get(await sign(id));
    const ask = (reason: string) =>
      reviseReport(world.ports(), night.inspector, { act: uuid(), inspectionId: id, reason });
    expect(failureOf(await ask('  ')).faults?.[0]?.pointer).toBe('/reason');
    expect(failureOf(await sign(id)).name).toBe('not-in-this-state');
    get(await ask('Lifter 1 exhaust was read on the oil groove'));
    expect(failureOf(await ask('again')).name).toBe('not-in-this-state');
    const { rows } = await fileOf(world, night.inspector, id);
    const lifter = rows.readings.find((row) => row.quantity === 'lifter-body-diameter');
    const again = reading({ value: { text: '0.8424', unit: 'in' } });
    const corrected = await send(world, night.inspector, id, [strike(lifter?.id ?? ''), again]);
    expect(get(corrected).received).toEqual([]);
    const second = get(await sign(id));
    expect(second.revision).toBe(2);
    const reports = await reportsOf(id);
    expect(reports.map(({ revision, reason, hash }) => [revision, reason, hash])).toEqual([
      [1, '', first.hash],
      [2, 'Lifter 1 exhaust was read on the oil groove', second.hash],
    ]);
    expect(JSON.parse(reports[1]?.document ?? '').revision.corrects).toBe(first.hash);
    const history = await readHistory(world.ports(), { seriesId: night.seriesId, id });
    expect(history.map(({ kind, by }) => [kind, by])).toEqual([
      ['inspection-changed', 'Ilse Törnkvist'],
      ['inspection-opened', 'Oona Brannick'],
      ['report-signed', 'Oona Brannick'],
      ['report-revised', 'Oona Brannick'],
    ]);
  });
});

describe('assignment', () => {
  it('refuses a conflict of interest and a stale page, and opens nothing without an inspector', async () => {
    const id = await openInspection(world, night, '7', false);
    const racer = await addActor(world, 'Racing Inspector', [
      { seriesId: night.seriesId, role: 'inspector' },
    ]);
    await world
      .ports()
      .db.execute('update public.entry set competitor_id = ? where car_number = ?', [
        racer.personId,
        '7',
      ]);
    const assign = (inspectorId: string | null, version: number, actor = night.chief) =>
      assignInspector(world.ports(), actor, {
        act: uuid(),
        inspectionId: id,
        inspectorId,
        bay: '3',
        version,
      });
    const refused = failureOf(await assign(racer.personId, 2));
    expect(refused.name).toBe('conflict-of-interest');
    expect(refused.detail).toContain('enters this car');
    expect(failureOf(await assign(night.inspector.personId, 1)).name).toBe('stale');
    expect(failureOf(await assign(night.inspector.personId, 2, night.inspector)).name).toBe(
      'absent',
    );
    expect(failureOf(await assign(night.competitor.personId, 2)).name).toBe('invalid');
    get(await assign(null, 2));
    const open = await changeState(world.ports(), night.chief, {
      act: uuid(),
      inspectionId: id,
      to: 'open',
      reason: '',
    });
    expect(failureOf(open).name).toBe('not-in-this-state');
  });
});
