/** What may tie an inspector to a competitor, beside what the records show by themselves. */
export const INTEREST_KINDS = ['team', 'builder', 'relation', 'other'] as const;

export type InterestKind = (typeof INTEREST_KINDS)[number];
