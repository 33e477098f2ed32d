import type { EntityManager } from '@mikro-orm/postgresql';
import { type EngineFacts, factNamed } from '@/domain/paddock/engine-facts';
import { EMPTY_DRAFT, findTyped, type PaperworkDraft, withAnswer } from '@/domain/paperwork/draft';
import type { PaperworkForm } from '@/domain/rulebook/form/form';
import type { Engine } from '@/entities/paperwork/engine';

/** What is known of an engine, by what a rulebook calls it. */
const factFor = (subject: string): keyof EngineFacts | 'seals' | undefined =>
  factNamed(subject) ?? (/seal/.test(subject) ? 'seals' : undefined);

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
export const filledIn = async (
  em: EntityManager,
  engine: Engine,
  competitorId: string,
  form: PaperworkForm,
  seal?: string,
): Promise<PaperworkDraft> => {
  const [last] = await em.execute<{ draft: PaperworkDraft }[]>(
    `select draft from public.paperwork
     where engine_id = ? and competitor_id = ? order by updated_at desc, version desc limit 1`,
    [engine.id, competitorId],
  );
  const { replies: _replies, ...before } = last?.draft ?? EMPTY_DRAFT;
  const facts = { ...engine, seals: seal ?? (await sealsOn(em, engine.id)) };
  return form.questions.reduce(
    (draft: PaperworkDraft, { kind, subject, per }) => {
      const fact = kind === 'text' ? factFor(subject) : undefined;
      const position = per === 'car' ? 'car' : 'engine';
      // A seal given just now replaces one that was written down before.
      const known = findTyped(draft, subject, position) !== undefined;
      return fact === undefined || (known && !(fact === 'seals' && seal !== undefined))
        ? draft
        : withAnswer(draft, { subject, position, typed: facts[fact] });
    },
    { ...before, note: '' },
  );
};
