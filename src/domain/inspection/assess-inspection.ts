import { pooledRepeatability, type Repeatability } from '../measurement/repeatability';
import { findAs, minus, type Quantity } from '../quantity/quantity';
import { fromStored } from '../quantity/stored';
import { decisionOf } from '../rulebook/evaluate/decision-of';
import { type Bearer, evaluateRules } from '../rulebook/evaluate/evaluate-rules';
import type { Facts, NumberFact } from '../rulebook/evaluate/facts';
import type { Per } from '../rulebook/quantities/entry';
import { getQuantityEntry } from '../rulebook/quantity-catalogue';
import type { RulesInForce } from '../rulebook/rules-in-force';
import type { BoreSheet } from '../tappet/bore-sheet';
import type { Completeness } from '../tappet/completeness';
import {
  type BoreLayout,
  type BorePosition,
  boreName,
  positionsOf,
} from '../tappet/layout/bore-layout';
import { DOMAIN_VERSION } from '../version';
import type { GaugeRecord } from './capture/gauge-record';
import { type JudgedReading, judgeReadings } from './capture/readings-that-count';
import { positionKey, type ReadingRow, type RemarkRow, type ZeroRow } from './capture/rows';
import { completenessBy } from './completeness';
import type { Finding } from './finding';
import { withRows } from './findings';
import {
  answersFrom,
  gapsFrom,
  positionsIn,
  readingsBehind,
  standingOf,
  unstatedBecause,
} from './found-facts';
import { boreSetsOf } from './measure/bore-sets';
import { derivedNumbers } from './measure/derived-numbers';
import { joinSets } from './measure/join-sets';
import { measureSet, type SetResult } from './measure/measure-position';
import { plainNumbers } from './measure/plain-numbers';
import { referencesFrom } from './measure/reference-parts';
import { type RunOutcome, runOutcomes } from './measure/run-outcome';
import type { Capture } from './measure/runs';
import { choicesFrom, type SetChoice } from './second-set/choice';
import { withSets } from './second-set/each-set';
import { type SecondSet, secondSetsOf, standingFacts } from './second-set/second-sets';

/** Everything recorded in the bay, and what it is held against. */
export interface InspectionRecord {
  readonly rules: RulesInForce;
  readonly bearer: Bearer;
  readonly layout: BoreLayout;
  /** The event's IANA zone: a gauge's due day is a day there. */
  readonly zone: string;
  readonly readings: readonly ReadingRow[];
  readonly zeros: readonly ZeroRow[];
  readonly remarks: readonly RemarkRow[];
  readonly gauges: readonly GaugeRecord[];
  /** The accepted declaration as facts, for what must match it. */
  readonly paperwork?: Facts | undefined;
  /** Unit of lengths per bore; inches unless stated. */
  readonly unit?: string | undefined;
  readonly materials?: BoreSheet['materials'];
}

export interface BoreResult {
  readonly key: string;
  readonly position: BorePosition;
  /** First set and independent second ones. */
  readonly sets: readonly SetResult[];
  /** Each second set beside the first, with their agreement. */
  readonly secondSets: readonly SecondSet[];
  /** Which of them stands, as a person said; all together where nobody did. */
  readonly choice?: SetChoice | undefined;
}

export interface InspectionAssessment {
  readonly domainVersion: string;
  readonly bores: readonly BoreResult[];
  readonly findings: readonly Finding[];
  readonly completeness: Completeness;
  /** Bores whose closing zero failed: to be measured again. */
  readonly redo: readonly BorePosition[];
  /** Every zero run that was closed. */
  readonly runs: readonly RunOutcome[];
  readonly judged: readonly JudgedReading[];
  readonly facts: Facts;
}

/** What the clearance's own clause can bear: its window, and how fit it wants the gauge. */
const windowOf = (
  rules: RulesInForce,
): { readonly window?: Quantity<'length'>; readonly fitRatio?: string | undefined } => {
  for (const { requirement } of rules.clauses) {
    if (requirement?.kind !== 'limit' || requirement.quantity !== 'tappet-clearance') continue;
    const { min, max } = decisionOf(requirement).limits;
    const low = min && findAs('length', min);
    const high = max && findAs('length', max);
    if (low !== undefined && high !== undefined)
      return { window: minus(high, low), fitRatio: requirement.fitRatio };
  }
  return {};
};

/** Pooled over the true repeats of the whole inspection: same bore, set, run, depth and axis. */
const pooled = (counting: readonly JudgedReading[]): Repeatability | undefined => {
  const groups = new Map<string, JudgedReading[]>();
  for (const reading of counting) {
    const { quantity, depth, axis, set, zeroRunId = '' } = reading.row;
    if (quantity !== 'tappet-bore-diameter') continue;
    const place = [positionKey(reading.place, 'bore'), set, zeroRunId, depth, axis].join('\n');
    groups.set(place, [...(groups.get(place) ?? []), reading]);
  }
  const series = [...groups.values()].map((group) =>
    group.map(({ row }) => fromStored(row.value, 'length').value),
  );
  return pooledRepeatability(series) ?? undefined;
};

const rowsOf = (per: Per) => (per === 'lifter' ? 'bore' : per);

/**
 * From the rows of the bay to a result per bore and a finding per clause. The tablet and the server
 * run this same function on the same rows, in whatever order those arrived.
 */
export const assessInspection = (record: InspectionRecord): InspectionAssessment => {
  const { rules, layout, remarks, gauges } = record;
  const judged = judgeReadings(record.readings, remarks);
  const counting = judged.filter((reading) => reading.state === 'counts');
  const capture: Capture = {
    judged,
    zeros: record.zeros,
    gauges,
    unit: record.unit ?? 'in',
    ...windowOf(rules),
    materials: record.materials,
    repeatability: pooled(counting),
  };
  const choices = choicesFrom(remarks);
  const bores = positionsOf(layout).map((position): BoreResult => {
    const key = boreName(position);
    const sets = boreSetsOf(capture, key).map(measureSet);
    return { key, position, sets, secondSets: secondSetsOf(sets), choice: choices.get(key) };
  });
  const positions = positionsIn(layout);
  const plain = plainNumbers(counting, gauges);
  const numbers = [
    ...bores.flatMap(({ key, sets, choice }) =>
      withSets(joinSets(key, standingFacts(sets, choice)), sets),
    ),
    ...plain,
    ...derivedNumbers(plain, positions, rules),
  ].map((fact): NumberFact => {
    const per = rowsOf(getQuantityEntry(fact.quantity).per);
    const behind = readingsBehind(fact, counting, per);
    const { cannotSupportBreach, lift, checked } = standingOf(behind, record);
    return {
      ...fact,
      noStatement: unstatedBecause(behind, gauges),
      cannotSupportBreach: fact.cannotSupportBreach ?? cannotSupportBreach,
      liftedBy: fact.cannotSupportBreach === undefined ? lift : undefined,
      checked: checked.map(({ words }) => words),
    };
  });
  const facts: Facts = {
    origin: 'found',
    positions,
    numbers,
    answers: answersFrom(remarks),
    evidence: [],
    couldNotBeReached: gapsFrom(remarks),
    references: referencesFrom(counting, gauges),
    declared: record.paperwork,
  };
  return {
    domainVersion: DOMAIN_VERSION,
    bores,
    findings: withRows(evaluateRules(rules, facts, record.bearer), { rules, counting, remarks }),
    completeness: completenessBy(rules, layout, counting, remarks),
    redo: bores
      .filter(({ sets }) => sets.some(({ measurement }) => measurement.redo))
      .map(({ position }) => position),
    runs: runOutcomes(capture),
    judged,
    facts,
  };
};
