import { readBulletinContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockDraft } from '../draft/lock-draft';
import { appendPublication } from '../ruling/append-publication';
import { takeNumber } from '../ruling/next-number';
import { affectedEngines } from './affected-engines';
import { checkBulletin } from './check-bulletin';
import { tellCompetitors } from './tell-competitors';

export interface BulletinPublished {
  readonly number: number;
  readonly hash: string;
  /** Paperwork of the accepted engines that the bulletin makes illegal. */
  readonly affected: readonly string[];
}

/**
 * Publishes a bulletin's draft with the next number. Refused while a change does not fit the rules
 * it amends. The accepted engines that it makes illegal are kept with it; their owners, and all who
 * race in the class, are told by e-mail.
 */
export const publishBulletin = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly draftId: string;
    readonly version: number;
  },
): Promise<Result<BulletinPublished, Failure>> => {
  if (!may(actor, 'rulebook.publish', input.seriesId)) return fail(absent());
  const { act: id, seriesId, draftId, version } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'publish-bulletin', seriesId, input: { draftId, version } },
    async (act) => {
      const { em, at } = act;
      const where = { seriesId, id: draftId, kind: 'bulletin' } as const;
      const found = await lockDraft(
        em,
        where,
        version,
        'This bulletin has been published already.',
      );
      if (!found.ok) return found;
      const draft = found.value;
      const read = readBulletinContent(draft.content);
      if (!read.ok) return read;
      const { classId } = draft;
      const taken = await takeNumber(em, seriesId, classId, 'bulletin');
      if (taken === undefined) return fail(absent());
      const checked = await checkBulletin(em, seriesId, classId, read.value, at);
      if (checked === undefined) {
        return fail(
          failure('not-in-this-state', 'No edition is in force that a bulletin could amend.'),
        );
      }
      if (checked.faults.length > 0) return fail(invalid(checked.faults));
      const content: Bulletin = {
        ...read.value,
        id: draftId,
        number: taken.number,
        season: checked.before.season,
        edition: checked.before.edition,
        publishedAt: at.toISOString(),
      };
      draft.publishedAt = at;
      const engines = affectedEngines(seriesId, draftId, checked);
      const hash = appendPublication(
        act,
        actor,
        seriesId,
        classId,
        { kind: 'bulletin', content },
        { title: content.title, inForceAt: checked.countsFrom ?? null },
        engines.contents,
      );
      act.append('bulletin_engine', engines.rows);
      await tellCompetitors(deps, act, {
        seriesId,
        raceClass: taken.raceClass,
        bulletin: content,
        checked,
      });
      return ok({
        number: content.number,
        hash,
        affected: checked.affected.map((engine) => engine.id),
      });
    },
  );
};
