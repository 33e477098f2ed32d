import type { Outcome, Step } from '@/domain/ledger/verify/step';

/** What a check of something published came to. */
export interface Report {
  /** The one sentence that counts. */
  readonly headline: string;
  readonly outcome: Outcome;
  readonly steps: readonly Step[];
  /** What the checked record says, to be held against the page in hand. */
  readonly says: readonly string[];
  readonly keys: readonly string[];
}
