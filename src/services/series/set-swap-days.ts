import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RaceClass } from '@/entities/series/race-class';
import { type ActDeps, performAct } from '../act/perform-act';

/** Our own bounds: a day is the least that can be kept, and after a month the season has gone on. */
const FEWEST = 1;
const MOST = 30;

/**
 * Sets within how many days the rest of the paperwork is due after an engine was changed at the track.
 * It holds for swaps from now on: a swap keeps the day that was set when it was made.
 */
export const setSwapDays = async (
  deps: ActDeps,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly classId: string;
    /** As typed. */
    readonly days: string;
  },
): Promise<Result<{ readonly days: number }, Failure>> => {
  const { act: id, seriesId, classId } = input;
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  const days = /^\d{1,2}$/.test(input.days.trim()) ? Number(input.days) : 0;
  if (days < FEWEST || days > MOST) {
    const detail = `Give a whole number of days, ${FEWEST} to ${MOST}.`;
    return fail(invalid([{ pointer: '/days', detail }]));
  }
  return performAct(
    deps,
    actor,
    { id, kind: 'set-swap-days', seriesId, input: { classId, days: String(days) } },
    async ({ em }) => {
      const raceClass = await em.findOne(RaceClass, { seriesId, id: classId });
      if (raceClass === null) return fail(absent());
      raceClass.swapDueDays = days;
      return ok({ days });
    },
  );
};
