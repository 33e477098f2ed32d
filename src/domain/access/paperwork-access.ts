import { GRANT_RIGHTS, type GrantRight, type Helping } from './helping';
import { type Actor, seriesWhere } from './permission';

/** `see`: whoever may write or hand in sees the paperwork; a right to verdicts alone shows none of it. */
export type Need = 'see' | GrantRight;

/** A set of paperwork that is open: of one person, in these series, of these engines. */
export interface Opening {
  readonly competitorId: string;
  readonly seriesIds: readonly string[];
  readonly engineIds?: readonly string[] | undefined;
}

const grants = ({ rights }: Helping, need: Need): boolean =>
  need === 'see' ? rights.some((right) => right !== 'verdicts') : rights.includes(need);

/** The paperwork on which the actor may do this: their own, and what others let them. */
export const openings = (actor: Actor, need: Need): readonly Opening[] => [
  { competitorId: actor.personId, seriesIds: seriesWhere(actor, 'paperwork.hand-in') },
  ...(actor.helping ?? []).filter((helping) => grants(helping, need)),
];

const EVERY: readonly Need[] = ['see', ...GRANT_RIGHTS];

/** Everything the actor may do with one paperwork; empty where it is not open to them. */
export const rightsOn = (
  actor: Actor,
  paperwork: {
    readonly competitorId: string;
    readonly seriesId: string;
    readonly engineId: string;
  },
): readonly Need[] =>
  EVERY.filter((need) =>
    openings(actor, need).some(
      ({ competitorId, seriesIds, engineIds }) =>
        competitorId === paperwork.competitorId &&
        seriesIds.includes(paperwork.seriesId) &&
        (engineIds === undefined || engineIds.includes(paperwork.engineId)),
    ),
  );
