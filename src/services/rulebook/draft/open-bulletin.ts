import type { BulletinContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RaceClass } from '@/entities/series/race-class';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';

/** A bulletin before anything is written: it counts from the next event unless its writer says otherwise. */
export const EMPTY_BULLETIN: BulletinContent = {
  title: '',
  reason: '',
  changes: [],
  effective: { kind: 'next-event' },
};

/** Opens a bulletin's draft; several may be open at once. */
export const openBulletin = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly id: string;
    readonly classId: string;
    readonly content: BulletinContent;
  },
): Promise<Result<{ readonly draftId: string }, Failure>> => {
  if (!may(actor, 'rulebook.write', input.seriesId)) return fail(absent());
  const { act, seriesId, id, classId, content } = input;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'open-bulletin', seriesId, input: { id, classId, content } },
    async ({ em, at }) => {
      if ((await em.count(RaceClass, { seriesId, id: classId })) === 0) return fail(absent());
      em.persist(
        em.create(RulebookDraft, {
          seriesId,
          id,
          classId,
          kind: 'bulletin',
          title: content.title,
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
