import type { Fault } from '../failure';
import type { PenaltyRow } from '../rulebook/edition';
import type { RulesInForce } from '../rulebook/rules-in-force';
import { agreesWithStatement, computedStatement, type StatedFinding } from './computed-statement';
import type { Decision } from './notice/notice';

/** What an official writes down before publishing. */
export interface DecisionDraft {
  /** Revision of the signed report that was decided on. */
  readonly reportRevision: number;
  readonly decision: Decision;
  readonly clauses: readonly string[];
  /** A row of the class's schedule and its step, from 1; `null` for no breach. */
  readonly penalty: { readonly row: string; readonly step: number } | null;
  /** In the series' currency's smallest unit; `null` for none. */
  readonly moneyMinor: number | null;
  readonly reasons: string;
  /** Empty where the decision is what the findings say. */
  readonly againstComputedBecause: string;
}

type Rules = Pick<RulesInForce, 'clauses' | 'penalties'>;

/** The clauses on which a breach may be decided: mandatory, with a finding in the signed report. */
export const decidableClauses = (
  rules: Pick<RulesInForce, 'clauses'>,
  findings: readonly StatedFinding[],
): readonly string[] =>
  rules.clauses
    .filter(
      ({ number, force }) =>
        force === 'mandatory' && findings.some((finding) => finding.clause === number),
    )
    .map((clause) => clause.number);

/** The schedule's rows that the breached clauses name; the whole schedule where none names one. */
export const penaltyRowsFor = (rules: Rules, clauses: readonly string[]): readonly PenaltyRow[] => {
  const named = rules.clauses
    .filter((clause) => clauses.includes(clause.number))
    .map((clause) => clause.penaltyRow);
  const rows = rules.penalties.filter((row) => named.includes(row.row));
  return rows.length === 0 ? rules.penalties : rows;
};

/** The words for the n-th breach of a row; the last step holds for all later ones. */
export const penaltyWords = (row: PenaltyRow, step: number): string =>
  row.penalties[Math.min(step, row.penalties.length) - 1] ?? '';

/** Whether the program's own statement and the decision part ways, in the whole or on one clause. */
export const isAgainstStatement = (
  draft: Pick<DecisionDraft, 'decision' | 'clauses'>,
  findings: readonly StatedFinding[],
): boolean =>
  !agreesWithStatement(draft.decision, computedStatement(findings)) ||
  (draft.decision === 'breach' &&
    draft.clauses.some(
      (clause) => findings.find((finding) => finding.clause === clause)?.pass !== false,
    ));

/**
 * Why no breach can be decided on a clause, whatever the reasons: nothing speaks for one but readings
 * that make no statement, by a gauge that is not fit or cannot support a breach. In the report's words.
 */
export const findUnsupported = (
  clause: string,
  findings: readonly StatedFinding[],
): string | undefined => {
  const finding = findings.find((one) => one.clause === clause);
  const positions = finding?.perPosition ?? [];
  const speaksForOne = positions.some(({ pass, state }) => pass === false || state === 'too-close');
  if (finding === undefined || finding.pass === false || speaksForOne) return undefined;
  return positions.find(({ state }) => state === 'no-statement')?.sentence;
};

const blank = (text: string): boolean => text.trim() === '';

const breachFaults = (
  draft: DecisionDraft,
  rules: Rules,
  findings: readonly StatedFinding[],
): readonly Fault[] => {
  const open = decidableClauses(rules, findings);
  const unnamed = draft.clauses.filter((clause) => !open.includes(clause));
  const row = penaltyRowsFor(rules, draft.clauses).find(({ row }) => row === draft.penalty?.row);
  const step = draft.penalty?.step ?? 0;
  return [
    ...(draft.clauses.length === 0
      ? [{ pointer: '/clauses', detail: 'Name the clause that was breached.' }]
      : []),
    ...unnamed.map((clause) => ({
      pointer: '/clauses',
      detail: `The signed report has no finding on a mandatory clause ${clause}; no breach can be decided on it.`,
    })),
    ...draft.clauses.flatMap((clause) => {
      const because = findUnsupported(clause, findings);
      return because === undefined
        ? []
        : [
            {
              pointer: '/clauses',
              detail: `No breach of clause ${clause} can be decided on these readings. ${because}`,
            },
          ];
    }),
    ...(row === undefined
      ? [{ pointer: '/penalty', detail: 'Choose a penalty from the schedule of this class.' }]
      : []),
    ...(row !== undefined && !(Number.isInteger(step) && step >= 1 && step <= row.penalties.length)
      ? [{ pointer: '/penalty', detail: `Row ${row.row} has ${row.penalties.length} steps.` }]
      : []),
  ];
};

/** What keeps a decision from being published, each fault at its field. */
export const decisionFaults = (
  draft: DecisionDraft,
  rules: Rules,
  findings: readonly StatedFinding[],
): readonly Fault[] => [
  ...(draft.decision === 'breach'
    ? breachFaults(draft, rules, findings)
    : draft.clauses.length > 0 || draft.penalty !== null || draft.moneyMinor !== null
      ? [{ pointer: '/decision', detail: 'Without a breach there is no clause and no penalty.' }]
      : []),
  ...(blank(draft.reasons)
    ? [{ pointer: '/reasons', detail: 'Write the reasons; they are published.' }]
    : []),
  ...(isAgainstStatement(draft, findings) && blank(draft.againstComputedBecause)
    ? [
        {
          pointer: '/againstComputedBecause',
          detail: 'This is not what the findings say. Write why you decide otherwise.',
        },
      ]
    : []),
];
