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
}

/** Ends a clarification: a numbered act of its own, so that what was published stays readable. */
export interface Withdrawal {
  readonly id: string;
  readonly number: number;
  readonly season: string;
  /** The clarification's number and its clause. */
  readonly clarification: number;
  readonly clause: string;
  readonly reason: string;
  /** ISO 8601 instant in UTC; from then on the clarification counts no more. */
  readonly publishedAt: string;
}

/** Clarifications of a clause that no longer count at an instant (epoch milliseconds), with what ended them. */
export const withdrawnAt = (
  published: {
    readonly clarifications: readonly Clarification[];
    readonly withdrawals?: readonly Withdrawal[];
  },
  season: string,
  at: number,
): readonly { readonly clarification: Clarification; readonly withdrawal: Withdrawal }[] => {
  const ended = withdrawalsAt(published.withdrawals ?? [], season, at);
  return published.clarifications.flatMap((clarification) => {
    const withdrawal = ended.get(clarification.number);
    return withdrawal === undefined ? [] : [{ clarification, withdrawal }];
  });
};

/** The withdrawals that count at an instant (epoch milliseconds), by the clarification's number. */
export const withdrawalsAt = (
  withdrawals: readonly Withdrawal[],
  season: string,
  at: number,
): ReadonlyMap<number, Withdrawal> =>
  new Map(
    withdrawals
      .filter((row) => row.season === season && Date.parse(row.publishedAt) <= at)
      .sort((a, b) => b.number - a.number)
      .map((row) => [row.clarification, row]),
  );

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
