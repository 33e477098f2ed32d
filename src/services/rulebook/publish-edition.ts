import { LockMode } from '@mikro-orm/core';
import { readPublishable } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Edition } from '@/domain/rulebook/edition';
import { RaceClass } from '@/entities/series/race-class';
import { Season } from '@/entities/series/season';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { lockDraft } from './draft/lock-draft';
import { appendPublication } from './ruling/append-publication';

/**
 * Freezes a draft as the class's next edition, in force from `inForceAt` (never before now).
 * Refused while anything in it is ambiguous; each fault names its clause.
 */
export const publishEdition = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly draftId: string;
    readonly version: number;
    readonly inForceAt: string | null;
  },
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  if (!may(actor, 'rulebook.publish', input.seriesId)) return fail(absent());
  const { act: id, seriesId, draftId, version, inForceAt } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'publish-edition', seriesId, input: { draftId, version, inForceAt } },
    async (act) => {
      const { em, at } = act;
      const where = { seriesId, id: draftId, kind: 'edition' } as const;
      const found = await lockDraft(em, where, version, 'This draft has been published already.');
      if (!found.ok) return found;
      const draft = found.value;
      const content = readPublishable(draft.content);
      if (!content.ok) return content;
      const raceClass = await em.findOneOrFail(
        RaceClass,
        { seriesId, id: draft.classId },
        // One edition of a class at a time: the number follows from those before.
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const season = await em.findOneOrFail(Season, { seriesId, id: raceClass.seasonId });
      const [last] = await em.execute<{ last: number }[]>(
        `select coalesce(max(number), 0) as last from record.rule_publication
         where series_id = ? and class_id = ? and kind = 'edition'`,
        [seriesId, draft.classId],
      );
      const from = new Date(Math.max(at.getTime(), Date.parse(inForceAt ?? at.toISOString())));
      const edition: Edition = {
        id: draft.id,
        className: raceClass.name,
        season: season.name,
        number: (last?.last ?? 0) + 1,
        ...content.value,
        inForceAt: from.toISOString(),
      };
      draft.publishedAt = at;
      const hash = appendPublication(
        act,
        actor,
        seriesId,
        draft.classId,
        { kind: 'edition', content: edition },
        { title: draft.title, inForceAt: edition.inForceAt },
      );
      return ok({ number: edition.number, hash });
    },
  );
};
