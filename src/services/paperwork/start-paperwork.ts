import type { EntityManager } from '@mikro-orm/postgresql';
import { openings, rightsOn } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { EMPTY_DRAFT, type PaperworkDraft, withAnswer } from '@/domain/paperwork/draft';
import { fail, ok, type Result } from '@/domain/result';
import type { PaperworkForm } from '@/domain/rulebook/form/form';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { Engine } from '@/entities/paperwork/engine';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { RaceClass } from '@/entities/series/race-class';
import { type ActDeps, performAct } from '../act/perform-act';
import { holderOf } from '../engine/engine-holder';
import { findRules } from '../rulebook/find-rules';

/** What is known of an engine, by what a rulebook calls it. */
const FACTS = [
  [/block.*casting/, 'blockCasting'],
  [/head.*casting/, 'headCastings'],
  [/serial/, 'serial'],
  [/seal/, 'seals'],
] as const;

/** Seal numbers that a race-night swap put on record last, as one would write them down. */
const sealsOn = async (em: EntityManager, engineId: string): Promise<string> => {
  const [last] = await em.execute<{ seal: string }[]>(
    `select seal from record.engine_swap where to_engine_id = ? order by received_at desc limit 1`,
    [engineId],
  );
  return last?.seal ?? '';
};

/**
 * What the competitor last wrote about this engine, in whatever series; otherwise what is known of it:
 * castings, serial and seal, where the rules ask for them.
 */
const filledIn = async (
  em: EntityManager,
  engine: Engine,
  competitorId: string,
  form: PaperworkForm,
): Promise<PaperworkDraft> => {
  const [last] = await em.execute<{ draft: PaperworkDraft }[]>(
    `select draft from public.paperwork
     where engine_id = ? and competitor_id = ? order by updated_at desc, version desc limit 1`,
    [engine.id, competitorId],
  );
  if (last !== undefined) {
    const { replies: _replies, ...draft } = last.draft;
    return { ...draft, note: '' };
  }
  const facts = { ...engine, seals: await sealsOn(em, engine.id) };
  return form.questions.reduce((draft, { kind, subject, per }) => {
    const fact = FACTS.find(([named]) => kind === 'text' && named.test(subject))?.[1];
    const position = per === 'car' ? 'car' : 'engine';
    return fact === undefined
      ? draft
      : withAnswer(draft, { subject, position, typed: facts[fact] });
  }, EMPTY_DRAFT);
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
