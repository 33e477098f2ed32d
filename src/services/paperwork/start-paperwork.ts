import type { EntityManager } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { EMPTY_DRAFT, type PaperworkDraft, withAnswer } from '@/domain/paperwork/draft';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { RaceClass } from '@/entities/series/race-class';
import { type ActDeps, performAct } from '../act/perform-act';
import { findRules } from '../rulebook/find-rules';

/** What the owner last wrote about this engine, in whatever series; the block's number if nothing. */
const filledIn = async (
  em: EntityManager,
  engine: Engine,
  competitorId: string,
): Promise<PaperworkDraft> => {
  const [last] = await em.execute<{ draft: PaperworkDraft }[]>(
    `select draft from public.paperwork
     where engine_id = ? and competitor_id = ? order by updated_at desc, version desc limit 1`,
    [engine.id, competitorId],
  );
  if (last !== undefined) return { ...last.draft, note: '' };
  return withAnswer(EMPTY_DRAFT, {
    subject: 'block-casting-number',
    position: 'engine',
    typed: engine.blockCasting,
  });
};

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
  if (!may(actor, 'paperwork.hand-in', seriesId)) return fail(absent());
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
      const engine = await em.findOne(Engine, { id: engineId, ownerId: actor.personId });
      if (raceClass === null || engine === null) return fail(absent());
      if ((await findRules(em, seriesId, classId, at)) === undefined) {
        const detail = `${raceClass.name} has no rulebook in force yet: there is nothing to declare against.`;
        return fail(failure('not-in-this-state', detail));
      }
      const open = await em.count(Paperwork, {
        seriesId,
        classId,
        engineId,
        carNumber,
        competitorId: actor.personId,
        state: { $in: ['draft', 'handed-in', 'returned'] },
      });
      if (open > 0) {
        const detail = `Paperwork of ${engine.reference} for car ${carNumber} in ${raceClass.name} is open already. Go on with that one.`;
        return fail(failure('not-in-this-state', detail));
      }
      const draft = await filledIn(em, engine, actor.personId);
      em.persist(
        em.create(Paperwork, {
          seriesId,
          id,
          classId,
          competitorId: actor.personId,
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
