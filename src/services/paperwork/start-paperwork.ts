import { openings, rightsOn } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { Engine } from '@/entities/paperwork/engine';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { RaceClass } from '@/entities/series/race-class';
import { type ActDeps, performAct } from '../act/perform-act';
import { holderOf } from '../engine/engine-holder';
import { findRules } from '../rulebook/find-rules';
import { filledIn } from './filled-in';

/** Begins the paperwork of one of the actor's engines for a class, with what is known of it filled in. */
export const startPaperwork = async (
  deps: ActDeps,
  actor: Actor,
  input: {
    readonly act: string;
    /** Client-made UUIDv7 of the paperwork. */
    readonly id: string;
    readonly seriesId: string;
    readonly classId: string;
    readonly engineId: string;
    readonly carNumber: string;
  },
): Promise<Result<{ readonly paperworkId: string }, Failure>> => {
  const { act, id, seriesId, classId, engineId } = input;
  if (!openings(actor, 'answers').some(({ seriesIds }) => seriesIds.includes(seriesId)))
    return fail(absent());
  const carNumber = input.carNumber.trim().toUpperCase();
  if (!/^[0-9A-Z]{1,6}$/.test(carNumber)) {
    const detail = 'A car number is 1 to 6 digits and capital letters, such as 12J.';
    return fail(invalid([{ pointer: '/carNumber', detail }]));
  }
  const request = { id, classId, engineId, carNumber };
  return performAct(
    deps,
    actor,
    { id: act, kind: 'start-paperwork', seriesId, input: request },
    async ({ em, at }) => {
      const raceClass = await em.findOne(RaceClass, { seriesId, id: classId });
      const engine = await em.findOne(Engine, { id: engineId });
      if (raceClass === null || engine === null) return fail(absent());
      const competitorId = holderOf(engine, at);
      if (!rightsOn(actor, { competitorId, seriesId, engineId }).includes('answers'))
        return fail(absent());
      const standing = await findRules(em, seriesId, classId, at);
      if (standing === undefined) {
        const detail = `${raceClass.name} has no rulebook in force yet: there is nothing to declare against.`;
        return fail(failure('not-in-this-state', detail));
      }
      const open = await em.count(Paperwork, {
        seriesId,
        classId,
        engineId,
        carNumber,
        competitorId,
        state: { $in: ['draft', 'handed-in', 'returned'] },
      });
      if (open > 0) {
        const detail = `Paperwork of ${engine.reference} for car ${carNumber} in ${raceClass.name} is open already. Go on with that one.`;
        return fail(failure('not-in-this-state', detail));
      }
      const draft = await filledIn(em, engine, competitorId, paperworkForm(standing.rules));
      em.persist(
        em.create(Paperwork, {
          seriesId,
          id,
          classId,
          competitorId,
          engineId,
          carNumber,
          state: 'draft',
          draft: draft as unknown as Record<string, unknown>,
          versions: 0,
          updatedBy: actor.personId,
          updatedAt: at,
        }),
      );
      return ok({ paperworkId: id });
    },
  );
};
