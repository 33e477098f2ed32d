import type { Outcome } from '@/domain/ledger/verify/step';
import type { Status } from '../look/status';

/** How the outcome of a check is marked and called, wherever checks are listed. */
export const OUTCOME_MARKS: Readonly<Record<Outcome, Status>> = {
  passed: 'within',
  failed: 'outside',
  'not checked': 'not-measured',
};

export const OUTCOME_WORDS: Readonly<Record<Outcome, string>> = {
  passed: 'Holds',
  failed: 'Does not hold',
  'not checked': 'Not checked',
};
