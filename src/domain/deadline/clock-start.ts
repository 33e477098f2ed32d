/** What starts a clock. */
export type Trigger =
  | 'results-published'
  | 'inspection-closed'
  | 'verdict-published'
  | 'protest-decided';

/** Something that was made public or told to the parties. */
export interface Publication {
  readonly trigger: Trigger;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  /** Made by whoever may make it, in the place and form that the rules name. */
  readonly lawful: boolean;
  readonly where: string;
}

/**
 * The earliest lawful publication starts the clock: an unlawful one starts none, a later repeat
 * moves nothing. Nothing while there is none.
 */
export const findClockStart = (
  trigger: Trigger,
  publications: readonly Publication[],
): Publication | undefined =>
  publications
    .filter((publication) => publication.trigger === trigger && publication.lawful)
    .sort((a, b) => Date.parse(a.at) - Date.parse(b.at))[0];
