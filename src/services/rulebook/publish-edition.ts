import { LockMode } from '@mikro-orm/core';
import { readPublishable } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, stale } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import type { Edition } from '@/domain/rulebook/edition';
import { RaceClass } from '@/entities/series/race-class';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import { Season } from '@/entities/series/season';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { publicationDocument } from './publication';

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
    async ({ em, at, append, line }) => {
      const draft = await em.findOne(
        RulebookDraft,
        { seriesId, id: draftId, kind: 'edition' },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (draft === null) return fail(absent());
      if (draft.publishedAt) {
        return fail(failure('not-in-this-state', 'This draft has been published already.'));
      }
      if (draft.version !== version) return fail(stale());
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
      const { document, hash } = publicationDocument({ kind: 'edition', content: edition });
      draft.publishedAt = at;
      append('rule_publication', [
        {
          series_id: seriesId,
          id: draft.id,
          class_id: draft.classId,
          kind: 'edition',
          number: edition.number,
          title: draft.title,
          document,
          hash,
          in_force_at: edition.inForceAt,
          published_at: at.toISOString(),
          published_by: actor.personId,
        },
      ]);
      line({
        seriesId,
        kind: 'rulebook-published',
        contents: { edition: { text: document, open: true } },
        refs: { edition: draft.id },
      });
      return ok({ number: edition.number, hash: toHex(hash) });
    },
  );
};
