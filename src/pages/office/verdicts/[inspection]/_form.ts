import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { StatedFinding } from '@/domain/verdict/computed-statement';
import { type DecisionDraft, penaltyRowsFor } from '@/domain/verdict/decision';
import { findMinor, moneyText } from '@/domain/verdict/money';
import type { ComputedStatement } from '@/domain/verdict/notice';

/** The decision form's fields as typed. */
export interface TypedDecision {
  readonly decision: string;
  readonly clauses: readonly string[];
  /** `A|1`: a row and its step. */
  readonly penalty: string;
  readonly money: string;
  readonly reasons: string;
  readonly against: string;
}

const EMPTY: TypedDecision = {
  decision: '',
  clauses: [],
  penalty: '',
  money: '',
  reasons: '',
  against: '',
};

/**
 * What the form of a new decision is filled in with: a failing finding's clauses, and the next step of
 * the row that the first of them names. Otherwise nothing is chosen; the person decides either way.
 */
export const suggestion = (sheet: {
  readonly computed: ComputedStatement;
  readonly decidable: readonly string[];
  readonly findings: readonly StatedFinding[];
  readonly rules: Pick<RulesInForce, 'clauses' | 'penalties'>;
  readonly penalties: readonly { readonly row: string; readonly nextStep: number }[];
}): TypedDecision => {
  if (sheet.computed === 'none') return EMPTY;
  if (sheet.computed === 'pass') return { ...EMPTY, decision: 'no-breach' };
  const clauses = sheet.decidable.filter((number) =>
    sheet.findings.some(({ clause, pass }) => clause === number && pass === false),
  );
  const rows = penaltyRowsFor(sheet.rules, clauses);
  const next = sheet.penalties.find(({ row }) => row === rows[0]?.row);
  // Where no clause names its row, which one it is remains to be chosen.
  const named = sheet.rules.clauses.some(
    ({ number, penaltyRow }) => clauses.includes(number) && penaltyRow === next?.row,
  );
  return {
    ...EMPTY,
    decision: 'breach',
    clauses,
    penalty: next === undefined || !named ? '' : `${next.row}|${next.nextStep}`,
  };
};

export const typedFrom = (form: FormData): TypedDecision => {
  const text = (name: string) => String(form.get(name) ?? '');
  return {
    decision: text('decision'),
    clauses: form.getAll('clauses').map(String),
    penalty: text('penalty'),
    money: text('moneyMinor'),
    reasons: text('reasons').replaceAll('\r\n', '\n'),
    against: text('againstComputedBecause').replaceAll('\r\n', '\n'),
  };
};

/** A kept draft back in the form. */
export const typedOf = (draft: DecisionDraft, currency: string): TypedDecision => ({
  decision: draft.decision,
  clauses: draft.clauses,
  penalty: draft.penalty === null ? '' : `${draft.penalty.row}|${draft.penalty.step}`,
  money: draft.moneyMinor === null ? '' : moneyText(String(draft.moneyMinor), currency),
  reasons: draft.reasons,
  against: draft.againstComputedBecause,
});

/** The plain decision, or the problems that keep it from being one. */
export const readDecision = (
  typed: TypedDecision,
  report: { readonly revision: number; readonly currency: string },
):
  | { readonly draft: DecisionDraft }
  | { readonly problems: readonly { readonly field: string; readonly message: string }[] } => {
  const { decision } = typed;
  const breach = decision === 'breach';
  const [row = '', step = ''] = typed.penalty.split('|');
  const money = typed.money.trim() === '' ? null : findMinor(typed.money, report.currency);
  const problems = [
    ...(decision === 'breach' || decision === 'no-breach'
      ? []
      : [{ field: 'decision', message: 'Choose breach or no breach.' }]),
    ...(money === undefined
      ? [{ field: 'moneyMinor', message: `Write the fine in ${report.currency}, such as 50.` }]
      : []),
  ];
  if (problems.length > 0 || money === undefined) return { problems };
  return {
    draft: {
      reportRevision: report.revision,
      decision: breach ? 'breach' : 'no-breach',
      clauses: breach ? typed.clauses : [],
      penalty: breach && row !== '' ? { row, step: Number(step) } : null,
      moneyMinor: breach ? money : null,
      reasons: typed.reasons,
      againstComputedBecause: typed.against,
    },
  };
};
