import type { ClauseResult } from '../rulebook/clause-result';

/** A measurement or check held against one clause, as it stands in a signed report. */
export interface Finding extends ClauseResult {
  /** The numbers behind the statement: readings' ids in taking order. */
  readonly readings: readonly string[];
  readonly gauges: readonly string[];
  readonly photographs: readonly string[];
  /** The inspector's own words, where they add something. */
  readonly remark?: string | undefined;
}

/** A closed finding is corrected only by a new revision; both stay. */
export interface Revision {
  readonly number: number;
  readonly reason: string;
  readonly by: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  /** SHA-256 of the report that this one corrects. */
  readonly corrects: string;
}
