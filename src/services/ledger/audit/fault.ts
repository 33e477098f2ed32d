/** One thing in the database that is not as it was recorded. */
export interface AuditFault {
  /** Table of the record, `record.reading`, or `objects` for the object store. */
  readonly where: string;
  /** Which row or object, by its key. */
  readonly what: string;
  /** What does not hold, in one sentence. */
  readonly words: string;
}

export const faultIn =
  (where: string) =>
  (what: string, words: string): AuditFault => ({ where, what, words });
