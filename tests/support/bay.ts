import type { CapturesRequest } from '@/contracts/inspection/captures';
import type { SentRow } from '@/contracts/inspection/rows';
import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { pickCars } from '@/services/event/pick-cars';
import { saveGauge } from '@/services/gauge/save-gauge';
import { assignInspector } from '@/services/inspection/assign-inspector';
import { recordCaptures } from '@/services/inspection/capture/record-captures';
import { changeState } from '@/services/inspection/change-state';
import { findInspection } from '@/services/inspection/read/find-inspection';
import type { InspectionFile } from '@/services/inspection/read/inspection-file';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { addClass } from '@/services/series/add-class';
import { openSeason } from '@/services/series/open-season';
import { addActor, addSeries, type World } from './world';

/** The value of a result that must be good. */
export const get = <T>(result: Result<T, Failure>): T => {
  if (!result.ok) throw new Error(`${result.failure.name}: ${JSON.stringify(result.failure)}`);
  return result.value;
};

export const failureOf = (result: Result<unknown, Failure>): Failure => {
  if (result.ok) throw new Error('This was expected to be refused.');
  return result.failure;
};

/** A race night: a series with its tappet rulebook, an event, gauges, and the people it takes. */
export interface RaceNight {
  readonly seriesId: string;
  readonly classId: string;
  readonly seasonId: string;
  readonly eventId: string;
  readonly official: Actor;
  readonly chief: Actor;
  readonly inspector: Actor;
  readonly competitor: Actor;
  readonly micrometer: string;
  readonly dial: string;
  readonly ring: string;
}

const inch = (text: string) => ({ text, unit: 'in' });

const certificate = {
  number: 'C-1',
  expandedUncertainty: inch('0.00005'),
  coverageFactor: '2',
};
const calibrated = { calibratedOn: '2026-03-02', dueOn: '2027-03-02', certificate };

export const gaugeFigures = {
  micrometer: {
    kind: 'micrometer',
    name: 'Micrometer 0–1 in',
    division: inch('0.0001'),
    range: { from: inch('0'), to: inch('1') },
    ...calibrated,
  },
  dial: {
    kind: 'dial-bore-gauge',
    name: 'Dial bore gauge',
    division: inch('0.0001'),
    largerReads: 'plus',
    ...calibrated,
  },
  ring: {
    kind: 'setting-ring',
    name: 'Setting ring',
    size: inch('0.8440'),
    ...calibrated,
    certificate: { ...certificate, expandedUncertainty: inch('0.00002') },
  },
} as const;

export const openRaceNight = async (
  world: World,
  slug = 'corran-valley',
  { clauses, penalties }: Pick<typeof TAPPET_RULE_SET, 'clauses' | 'penalties'> = TAPPET_RULE_SET,
): Promise<RaceNight> => {
  const seriesId = await addSeries(world, slug);
  const ports = () => world.ports();
  const uuid = () => ports().random.uuid();
  const person = (
    name: string,
    role: 'official' | 'chief-inspector' | 'inspector' | 'competitor',
  ) => addActor(world, name, [{ seriesId, role }]);
  const official = await person('Ilse Törnkvist', 'official');
  const chief = await person('Perrin Oakhollow', 'chief-inspector');
  const inspector = await person('Oona Brannick', 'inspector');
  const competitor = await person('Tamsin Overley', 'competitor');
  const seasonId = uuid();
  const season = { id: seasonId, name: '2026', startsOn: '2026-01-01', endsOn: '2026-12-31' };
  get(await openSeason(ports(), official, { act: uuid(), seriesId, ...season }));
  const classId = uuid();
  const named = { id: classId, seasonId, name: 'Street Stock' };
  get(await addClass(ports(), official, { act: uuid(), seriesId, ...named }));
  const draftId = uuid();
  const content = { clauses, penalties } as unknown as Parameters<typeof openDraft>[2]['content'];
  const draft = { id: draftId, classId, title: 'First edition', content };
  get(await openDraft(ports(), official, { act: uuid(), seriesId, ...draft }));
  const publish = { act: uuid(), seriesId, draftId, version: 1, inForceAt: null };
  get(await publishEdition(ports(), official, publish));
  const eventId = uuid();
  const event = {
    id: eventId,
    seasonId,
    slug: 'july',
    name: 'July night',
    track: 'Quarrel Fen Oval',
    zone: 'America/Chicago',
    startsAt: '2026-07-11T23:00:00.000Z',
    endsAt: '2026-07-12T04:00:00.000Z',
    protestMinutes: 30,
  };
  get(await createEvent(ports(), official, { act: uuid(), seriesId, ...event }));
  const ids = { micrometer: uuid(), dial: uuid(), ring: uuid() };
  for (const [at, key] of (['micrometer', 'dial', 'ring'] as const).entries()) {
    const code = ['MC-01', 'DB-07', 'SR-03'][at] ?? '';
    const gauge = { id: ids[key], code, description: gaugeFigures[key], status: 'in-use' } as const;
    get(await saveGauge(ports(), chief, { act: uuid(), seriesId, version: 0, ...gauge }));
  }
  world.clock.set('2026-07-12T03:30:00.000Z');
  const people = { official, chief, inspector, competitor };
  return { seriesId, classId, seasonId, eventId, ...people, ...ids };
};

/** Enters a car, picks it, names the inspector and opens the inspection; gives its id. */
export const openInspection = async (
  world: World,
  night: RaceNight,
  carNumber: string,
  open = true,
): Promise<string> => {
  const ports = () => world.ports();
  const uuid = () => ports().random.uuid();
  const { seriesId, eventId, classId, official, inspector } = night;
  const entryId = uuid();
  const entry = {
    id: entryId,
    classId,
    carNumber,
    competitorName: night.competitor.name,
    engineReference: 'VR-2231',
    position: null,
  };
  get(await enterCars(ports(), official, { act: uuid(), seriesId, eventId, entries: [entry] }));
  const inspectionId = uuid();
  const pick = { inspectionId, entryId, because: 'position', words: '' } as const;
  get(await pickCars(ports(), official, { act: uuid(), seriesId, eventId, picks: [pick] }));
  const to = { act: uuid(), inspectionId, inspectorId: inspector.personId, bay: '2', version: 1 };
  get(await assignInspector(ports(), official, to));
  if (open)
    get(
      await changeState(ports(), inspector, { act: uuid(), inspectionId, to: 'open', reason: '' }),
    );
  return inspectionId;
};

const place = (bank: string, cylinder: string, valve: 'intake' | 'exhaust') => ({
  bank,
  cylinder,
  valve,
});

/** Rows as a tablet makes them. */
export const rowsFor = (world: World, night: RaceNight) => {
  const uuid = () => world.ports().random.uuid();
  let second = 0;
  const at = () => {
    second += 1;
    return new Date(Date.parse('2026-07-12T03:00:00.000Z') + second * 1000).toISOString();
  };
  const reading = (more: object): Extract<SentRow, { kind: 'reading' }> => ({
    kind: 'reading',
    id: uuid(),
    occurredAt: at(),
    quantity: 'lifter-body-diameter',
    place: place('left', '1', 'exhaust'),
    depth: 'top',
    axis: 'along',
    repeat: 1,
    set: 1,
    method: 'absolute',
    gaugeId: night.micrometer,
    value: inch('0.8423'),
    ...more,
  });
  const zero = (runId: string, end: 'opening' | 'closing', text: string): SentRow => ({
    kind: 'zero',
    id: uuid(),
    occurredAt: at(),
    runId,
    end,
    gaugeId: night.dial,
    zeroedOn: 'ring',
    ringId: night.ring,
    size: inch('0.8440'),
    reading: { text, unit: 'thou' },
  });
  const strike = (readingId: string): SentRow => ({
    kind: 'remark',
    id: uuid(),
    occurredAt: at(),
    place: place('', '', 'intake'),
    remark: 'strike',
    readingId,
    reason: 'wrong-value',
  });
  const move = (readingId: string, cylinder: string): SentRow => ({
    kind: 'remark',
    id: uuid(),
    occurredAt: at(),
    place: place('left', cylinder, 'exhaust'),
    remark: 'move',
    readingId,
    reason: '',
  });
  /** Lifter, opening zero, four bore readings, closing zero. */
  const fullBore = (cylinder = '1', readings = ['0.0', '0.1', '0.1', '0.0']): SentRow[] => {
    const runId = uuid();
    const here = { place: place('left', cylinder, 'exhaust') };
    const places = [
      ['above', 'along'],
      ['above', 'across'],
      ['below', 'along'],
      ['below', 'across'],
    ];
    return [
      reading(here),
      zero(runId, 'opening', '0.0'),
      ...places.map(([depth, axis], i) =>
        reading({
          ...here,
          quantity: 'tappet-bore-diameter',
          depth,
          axis,
          method: 'comparative',
          gaugeId: night.dial,
          zeroRunId: runId,
          value: { text: readings[i] ?? '0.0', unit: 'thou' },
        }),
      ),
      zero(runId, 'closing', '0.0'),
    ];
  };
  return { reading, zero, strike, move, fullBore };
};

export const send = (
  world: World,
  actor: Actor,
  inspectionId: string,
  rows: readonly SentRow[],
  more: Partial<CapturesRequest> = {},
) =>
  recordCaptures(world.ports(), actor, {
    act: world.ports().random.uuid(),
    clockOffsetMs: 0,
    rows: [...rows],
    inspectionId,
    ...more,
  });

export const fileOf = async (
  world: World,
  actor: Actor,
  inspectionId: string,
): Promise<InspectionFile> => get(await findInspection(world.ports(), actor, inspectionId));
