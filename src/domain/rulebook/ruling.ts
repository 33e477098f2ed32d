/** A public, numbered answer to a question about a clause. */
export interface Clarification {
  readonly id: string;
  readonly number: number;
  /** It counts in this season, while its clause is in force. */
  readonly season: string;
  readonly clause: string;
  readonly question: string;
  readonly answer: string;
  /** ISO 8601 instant in UTC; it counts from then on. */
  readonly publishedAt: string;
  /** From this instant on it counts no more. */
  readonly withdrawnAt?: string | undefined;
}

/** A dated exception from one clause, for one car or one engine. */
export interface Waiver {
  readonly id: string;
  readonly number: number;
  /** It counts in this season, while its clause is in force. */
  readonly season: string;
  readonly clause: string;
  readonly for:
    | { readonly kind: 'car'; readonly carNumber: string }
    | { readonly kind: 'engine'; readonly engineId: string; readonly engineName: string };
  readonly words: string;
  readonly reason: string;
  /** ISO 8601 instants in UTC; `fromAt` counts, `untilAt` no longer does. */
  readonly fromAt: string;
  readonly untilAt: string;
}
