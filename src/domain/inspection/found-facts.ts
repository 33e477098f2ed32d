import { isErrorKnown } from '../measurement/gauge-figures';
import { compareQuantities } from '../quantity/quantity';
import { fromStored } from '../quantity/stored';
import type { AnswerFact, GapFact, NumberFact, Positions } from '../rulebook/evaluate/facts';
import { getQuantityEntry, isQuantityName, QUANTITY_NAMES } from '../rulebook/quantity-catalogue';
import { type BoreLayout, boreName, positionsOf } from '../tappet/layout/bore-layout';
import { findWeakness, type GaugeRecord, gaugeOf, type Weakness } from './capture/gauge-record';
import type { JudgedReading } from './capture/readings-that-count';
import { inTakingOrder, positionKey, type RemarkRow, type ZeroRow } from './capture/rows';
import { type CheckedOnRing, checksOfTheNight, worstOf } from './gauge/ring-check';
import { standsOn } from './plan/worked-out';

/** Every bore and cylinder of a position map, as facts and results name them. */
export const positionsIn = (layout: BoreLayout): Positions => ({
  bores: positionsOf(layout).map((position) => ({
    key: boreName(position),
    label: `Bore ${boreName(position)}`,
  })),
  cylinders: layout.banks
    .flatMap((bank) => bank.cylinders)
    .sort((a, b) => a - b)
    .map((cylinder) => ({ key: String(cylinder), label: `Cylinder ${cylinder}` })),
});

const accepted = (remarks: readonly RemarkRow[], kind: RemarkRow['kind']): readonly RemarkRow[] =>
  inTakingOrder(remarks).filter((row) => row.kind === kind && row.standing === 'accepted');

/** The last answer of each check stands. */
export const answersFrom = (remarks: readonly RemarkRow[]): readonly AnswerFact[] => {
  const last = new Map<string, AnswerFact>();
  for (const { place, subject, answer } of accepted(remarks, 'check')) {
    const position = positionKey(place, 'bore');
    if (answer.value !== undefined)
      last.set(`${subject} ${position}`, { subject, position, answer: answer.value });
  }
  return [...last.values()];
};

/** A bore out of reach leaves open whatever is worked out from its readings. */
export const gapsFrom = (remarks: readonly RemarkRow[]): readonly GapFact[] =>
  accepted(remarks, 'not-reached').flatMap(({ place, subject }): readonly GapFact[] => {
    const position = positionKey(place, 'bore');
    if (subject === '') return [{ position }];
    if (!isQuantityName(subject)) return [{ position, subject }];
    return QUANTITY_NAMES.filter((name) => standsOn(name).includes(subject)).map((name) => ({
      position,
      subject: name,
    }));
  });

/** The readings that a number stands on: its own, the whole engine's, and those of reference parts. */
export const readingsBehind = (
  fact: Pick<NumberFact, 'quantity' | 'position'>,
  counting: readonly JudgedReading[],
  per: 'bore' | 'cylinder' | 'engine' | 'car',
): readonly JudgedReading[] =>
  counting.filter(
    ({ row, place }) =>
      standsOn(fact.quantity).includes(row.quantity) &&
      (row.referencePart !== undefined ||
        positionKey(place, per) === fact.position ||
        (row.quantity !== fact.quantity && positionKey(place, per) === 'engine')),
  );

interface Bay {
  readonly gauges: readonly GaugeRecord[];
  readonly zeros: readonly ZeroRow[];
  readonly zone: string;
}

/** The gauge of a reading, and the ring on which its run was zeroed. */
const instrumentsOf = ({ row }: JudgedReading, zeros: readonly ZeroRow[]) => {
  const rings = zeros
    .filter((zero) => row.zeroRunId !== undefined && zero.runId === row.zeroRunId)
    .flatMap((zero) => zero.ringId ?? []);
  const size = row.method === 'absolute' ? sizeOf(row) : undefined;
  return [{ id: row.gaugeId, size }, ...rings.map((id) => ({ id, size: undefined }))];
};

const UNREGISTERED = 'the gauge is not in the register';

/** What stands against a breach on these readings, and the ring checks that may make up for it. */
export interface Standing {
  readonly cannotSupportBreach?: string | undefined;
  /** Only where an overdue calibration is all that stands against it, each time with a check. */
  readonly lift?: CheckedOnRing | undefined;
  /** Gauges of these readings that were checked on a ring that night. */
  readonly checked: readonly CheckedOnRing[];
}

const larger = (a: CheckedOnRing | undefined, b: CheckedOnRing): CheckedOnRing =>
  a !== undefined && compareQuantities(a.off, b.off) >= 0 ? a : b;

/** By the gauges behind readings: one unknown, out of calibration, found bad or out of its range. */
export const standingOf = (readings: readonly JudgedReading[], bay: Bay): Standing => {
  const checked = new Map<string, CheckedOnRing>();
  let weakness: Weakness | undefined;
  let lift: CheckedOnRing | undefined;
  for (const reading of readings) {
    const { occurredAt } = reading.row;
    for (const { id, size } of instrumentsOf(reading, bay.zeros)) {
      const record = bay.gauges.find((gauge) => gauge.id === id);
      if (record === undefined) return { cannotSupportBreach: UNREGISTERED, checked: [] };
      const found = findWeakness(record, { occurredAt, zone: bay.zone, size });
      const night = checksOfTheNight(record.ringChecks ?? [], occurredAt);
      const worst = worstOf(record.code, night, bay.zone);
      if (worst !== undefined) checked.set(record.id, worst);
      if (found === undefined) continue;
      if (!found.overdue || worst === undefined)
        return { cannotSupportBreach: found.words, checked: [...checked.values()] };
      weakness ??= found;
      lift = larger(lift, worst);
    }
  }
  return { cannotSupportBreach: weakness?.words, lift, checked: [...checked.values()] };
};

/** Why nothing can be stated from readings: how far a gauge is off is not known at all. */
export const unstatedBecause = (
  readings: readonly JudgedReading[],
  gauges: readonly GaugeRecord[],
): string | undefined => {
  for (const { row } of readings) {
    const record = gauges.find((gauge) => gauge.id === row.gaugeId);
    if (record === undefined) return UNREGISTERED;
    const { dimension } = getQuantityEntry(row.quantity);
    if (!isErrorKnown(gaugeOf(record, dimension), dimension))
      return 'the gauge’s error is not known';
  }
  return undefined;
};

const sizeOf = (row: JudgedReading['row']) =>
  fromStored(row.value, getQuantityEntry(row.quantity).dimension);
