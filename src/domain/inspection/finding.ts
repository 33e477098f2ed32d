import type { ClauseResult } from '../rulebook/clause-result';

/** A measurement or check held against one clause, as it stands in a signed report. */
export interface Finding extends ClauseResult {
  /** Ids of the rows behind the statement, in taking order. */
  readonly readings: readonly string[];
  readonly checks: readonly string[];
  readonly gauges: readonly string[];
  readonly photographs: readonly string[];
}

/** A closed report is corrected only by a new revision with a reason; both stay. */
export interface Revision {
  readonly number: number;
  /** Empty for the first. */
  readonly reason: string;
  /** SHA-256, hexadecimal, of the report that this one corrects. */
  readonly corrects?: string | undefined;
}
