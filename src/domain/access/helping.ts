/** What a competitor may let a builder do with an engine's paperwork. */
export type GrantRight = 'sheets' | 'answers' | 'hand-in' | 'verdicts';

export const GRANT_RIGHTS: readonly GrantRight[] = ['sheets', 'answers', 'hand-in', 'verdicts'];

export const RIGHT_WORDS: { readonly [R in GrantRight]: string } = {
  sheets: 'Write the measurement sheets',
  answers: 'Answer the questions and add photographs',
  'hand-in': 'Hand the paperwork in',
  verdicts: 'See verdicts and what was found',
};

/** What somebody may do for another person: as their builder, or as the guardian of a minor. */
export interface Helping {
  readonly as: 'builder' | 'guardian';
  readonly competitorId: string;
  readonly competitorName: string;
  /** Series in which that competitor may hand in. */
  readonly seriesIds: readonly string[];
  /** Nothing where all engines are meant. */
  readonly engineIds?: readonly string[] | undefined;
  readonly rights: readonly GrantRight[];
}
