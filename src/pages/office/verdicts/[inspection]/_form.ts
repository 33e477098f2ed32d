import type { DecisionDraft } from '@/domain/verdict/decision';
import { findMinor, moneyText } from '@/domain/verdict/money';
import { suggestedDecision } from '@/domain/verdict/suggested-decision';

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

/** What the findings say, filled in for the person to change or to write down. */
export const suggestion = (...said: Parameters<typeof suggestedDecision>): TypedDecision => {
  const { decision = '', clauses, penalty } = suggestedDecision(...said);
  return {
    ...EMPTY,
    decision,
    clauses,
    penalty: penalty === null ? '' : `${penalty.row}|${penalty.step}`,
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
