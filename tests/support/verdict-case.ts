import { assessInspection } from '@/domain/inspection/assess-inspection';
import type { ReadingRow } from '@/domain/inspection/capture/rows';
import { type ReportParts, reportDocument } from '@/domain/inspection/report';
import { canonicalJson } from '@/domain/ledger/canonical';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { boreName, positionsOf } from '@/domain/tappet/layout/bore-layout';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import type { DecisionDraft } from '@/domain/verdict/decision';
import { at, body, foot, GAUGES, reading, record, remark, zero } from '../domain/inspection/build';

const [LAYOUT] = GENERIC_LAYOUTS;
if (LAYOUT === undefined) throw new Error('no layout');
export const V8 = LAYOUT;

export const STREET_EIGHT: RulesInForce = {
  className: 'Street Eight',
  season: '2026',
  edition: 4,
  clauses: TAPPET_RULE_SET.clauses,
  penalties: TAPPET_RULE_SET.penalties,
  bulletins: [2],
  clarifications: [],
  waivers: [],
  sources: TAPPET_RULE_SET.clauses.map(({ number }) => ({
    clause: number,
    edition: 4,
    ...(number === '4.3' ? { bulletin: 2 } : {}),
  })),
};

export interface Engine {
  /** Foot in inches by bore; sound where none is given. */
  readonly feet?: Readonly<Record<string, string>>;
  readonly bodies?: Readonly<Record<string, string>>;
  /** Comparative clearance readings by bore; a loose one is advisory only. */
  readonly clearances?: Readonly<Record<string, string>>;
  readonly inspector?: { readonly id: string; readonly name: string };
  readonly second?: { readonly id: string; readonly bore: string; readonly foot: string };
  readonly inspectionId?: string;
  readonly revision?: number;
}

const readingsOf = (engine: Engine): readonly ReadingRow[] => {
  let second = 0;
  const next = (letter: string) => {
    second += 1;
    return `${letter}${second}`;
  };
  const takenBy = engine.inspector?.id ?? 'inspector';
  return positionsOf(V8).flatMap((position): readonly ReadingRow[] => {
    const key = boreName(position);
    const place = {
      bank: position.bank,
      cylinder: String(position.cylinder),
      valve: position.valve,
    };
    const more = { place, takenBy };
    const again = engine.second;
    return [
      body(next('b'), engine.bodies?.[key] ?? '0.8423', more),
      foot(next('f'), engine.feet?.[key] ?? '0.8425', more),
      reading(next('c'), engine.clearances?.[key] ?? '-0.0016', {
        ...more,
        method: 'comparative',
        gaugeId: 'dial',
        zeroRunId: 'run1',
      }),
      ...(again?.bore === key
        ? [
            body(next('b'), engine.bodies?.[key] ?? '0.8423', { place, takenBy: again.id, set: 2 }),
            foot(next('f'), again.foot, { place, takenBy: again.id, set: 2 }),
          ]
        : []),
    ];
  });
};

const CHECKS = [
  ['tappet-type', 'flat'],
  ['bore-bushed', 'no'],
] as const;

/** A signed report's canonical text, as the domain makes it from an engine's readings. */
export const reportText = (engine: Engine = {}, rules: RulesInForce = STREET_EIGHT): string => {
  const rows = record({
    rules,
    layout: V8,
    readings: readingsOf(engine),
    zeros: [zero('z0', 'opening', '0.0000'), zero('z99', 'closing', '0.0000')],
    remarks: CHECKS.map(([subject, value], i) =>
      remark(`k${i + 100}`, 'check', { subject, answer: { value } }),
    ),
  });
  const parts: ReportParts = {
    inspectionId: engine.inspectionId ?? 'i1',
    carNumber: '12J',
    className: rules.className,
    event: 'Round 7',
    pickedBecause: 'finished first',
    inspector: engine.inspector ?? { id: 'inspector', name: 'Oona Brannick' },
    witness: { name: 'Wren Halloway', role: 'competitor', outcome: 'signed' },
    revision: {
      number: engine.revision ?? 1,
      reason: engine.revision === undefined ? '' : 'Corrected',
    },
    rulesHash: 'aa',
    chainHead: 'bb',
    layout: V8,
    zeros: rows.zeros,
    remarks: rows.remarks,
    gauges: GAUGES,
    photographs: [],
    signedAt: at(6480),
  };
  return canonicalJson(reportDocument(parts, assessInspection(rows)));
};

/** Three feet too large, one clearance outside the advisory window. */
export const BIG_FEET: Engine = {
  feet: { '3 exhaust': '0.8485', '5 exhaust': '0.8481', '6 exhaust': '0.8479' },
  clearances: { '7 intake': '-0.0024' },
};

export const BREACH: DecisionDraft = {
  reportRevision: 1,
  decision: 'breach',
  clauses: ['4.3'],
  penalty: { row: 'A', step: 1 },
  moneyMinor: null,
  reasons: 'Three lifters have a foot larger than their body by far more than clause 4.3 allows.',
  againstComputedBecause: '',
};

export const NO_BREACH: DecisionDraft = {
  reportRevision: 1,
  decision: 'no-breach',
  clauses: [],
  penalty: null,
  moneyMinor: null,
  reasons: 'Every mandatory clause that was checked is kept.',
  againstComputedBecause: '',
};
