import type { Written } from '../../quantity/dimension';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import type { BoreLayout } from '../../tappet/layout/bore-layout';
import { assessInspection } from '../assess-inspection';
import type { GaugeRecord } from '../capture/gauge-record';
import { type ReadingRow, type RemarkRow, WHOLE_ENGINE } from '../capture/rows';

/** One check of one car at the line. */
export interface TakenCheck {
  readonly id: string;
  readonly takenBy: string;
  /** ISO 8601 instant in UTC. */
  readonly takenAt: string;
  readonly carNumber: string;
  readonly clause: string;
  readonly answer?: string | undefined;
  readonly value?: Written | undefined;
  readonly gaugeId?: string | undefined;
}

export interface JudgedCheck {
  readonly state: 'within' | 'outside' | 'no-statement';
  /** `false` for a mandatory clause that is not kept; `null` where nothing passes or fails. */
  readonly pass: boolean | null;
  readonly sentence: string;
}

/** A car that stays together has no bores to be read. */
const WHOLE_CAR: BoreLayout = { name: 'Whole car', viewedFrom: 'front', banks: [] };

/** Holds one check against its clause, by the same assessment as a teardown. */
export const judgeLineCheck = (
  rules: RulesInForce,
  check: TakenCheck,
  bay: { readonly zone: string; readonly gauges: readonly GaugeRecord[] },
): JudgedCheck => {
  const clause = rules.clauses.find(({ number }) => number === check.clause);
  const rule = clause?.requirement;
  if (clause === undefined || rule === undefined)
    throw new RangeError(`There is nothing to check in clause ${check.clause}.`);
  const { id, takenBy, takenAt: occurredAt, answer, value, gaugeId } = check;
  const row = { id, takenBy, occurredAt, standing: 'accepted', place: WHOLE_ENGINE } as const;
  const reading: readonly ReadingRow[] =
    rule.kind === 'limit' && value !== undefined && gaugeId !== undefined
      ? [
          {
            ...row,
            quantity: rule.quantity,
            depth: '',
            axis: '',
            repeat: 1,
            set: 1,
            method: 'absolute',
            gaugeId,
            value,
          },
        ]
      : [];
  const remark: readonly RemarkRow[] =
    'subject' in rule && answer !== undefined
      ? [{ ...row, kind: 'check', subject: rule.subject, answer: { value: answer }, reason: '' }]
      : [];
  const [finding] = assessInspection({
    rules: { ...rules, clauses: [clause] },
    bearer: { carNumber: check.carNumber },
    layout: WHOLE_CAR,
    zone: bay.zone,
    readings: reading,
    zeros: [],
    remarks: remark,
    gauges: bay.gauges,
  }).findings;
  if (finding === undefined) throw new RangeError(`Clause ${check.clause} gave no finding.`);
  const { pass, state, sentence } = finding;
  if (pass !== null) return { state: pass ? 'within' : 'outside', pass, sentence };
  const outside = state === 'outside' || state === 'does-not-comply';
  // An advisory clause warns; a gauge that supports no breach leaves it open.
  return {
    state: outside && clause.force === 'advisory' ? 'outside' : 'no-statement',
    pass,
    sentence,
  };
};
