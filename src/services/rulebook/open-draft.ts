import type { RulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RaceClass } from '@/entities/series/race-class';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Opens the draft of a class's next edition, from given content (a rule set, an earlier edition, nothing). */
export const openDraft = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly id: string;
    readonly classId: string;
    readonly title: string;
    readonly content: RulebookContent;
  },
): Promise<Result<{ readonly draftId: string }, Failure>> => {
  if (!may(actor, 'rulebook.write', input.seriesId)) return fail(absent());
  const { act, seriesId, id, classId, title, content } = input;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'open-draft', seriesId, input: { id, classId, title, content } },
    async ({ em, at }) => {
      if ((await em.count(RaceClass, { seriesId, id: classId })) === 0) return fail(absent());
      const open = { seriesId, classId, kind: 'edition' as const, publishedAt: null };
      if ((await em.count(RulebookDraft, open)) > 0) {
        return fail(
          failure(
            'not-in-this-state',
            'A draft of the next edition is open already. Go on with that one.',
          ),
        );
      }
      em.persist(
        em.create(RulebookDraft, {
          seriesId,
          id,
          classId,
          kind: 'edition',
          title,
          content: content as unknown as Record<string, unknown>,
          version: 1,
          updatedBy: actor.personId,
          updatedAt: at,
        }),
      );
      return ok({ draftId: id });
    },
  );
};
