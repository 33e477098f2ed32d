import { LockMode } from '@mikro-orm/core';
import { readBulletinContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import { formatInZone } from '@/domain/deadline/format-in-zone';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import { Series } from '@/entities/series/series';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import { appendPublication } from '../ruling/append-publication';
import { takeNumber } from '../ruling/next-number';
import { checkBulletin } from './check-bulletin';

export interface BulletinPublished {
  readonly number: number;
  readonly hash: string;
  /** Paperwork of the accepted engines that the bulletin makes illegal. */
  readonly affected: readonly string[];
}

/**
 * Publishes a bulletin's draft with the next number. Refused while a change does not fit the rules
 * it amends. Owners of accepted engines that it makes illegal are told by e-mail.
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
      const draft = await em.findOne(
        RulebookDraft,
        { seriesId, id: draftId, kind: 'bulletin' },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (draft === null) return fail(absent());
      if (draft.publishedAt) {
        return fail(failure('not-in-this-state', 'This bulletin has been published already.'));
      }
      if (draft.version !== version) return fail(stale());
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
      const hash = appendPublication(
        act,
        actor,
        seriesId,
        classId,
        { kind: 'bulletin', content },
        { title: content.title, inForceAt: checked.countsFrom ?? null },
      );
      const { raceClass } = taken;
      const series = await em.findOneOrFail(Series, { id: seriesId });
      const from =
        checked.countsFrom === undefined
          ? 'from the next event'
          : `from ${formatInZone(checked.countsFrom, series.zone)}`;
      for (const engine of checked.affected) {
        const results = checked.trial?.failed.find((one) => one.id === engine.id)?.results ?? [];
        for (const { personId, email } of engine.owners) {
          queueMail(deps, em, act, {
            seriesId,
            personId,
            address: email,
            kind: 'bulletin-affects-engine',
            subject: `${raceClass.name}: bulletin ${content.number} affects ${engine.name}`,
            paragraphs: [
              `${series.name} published bulletin ${content.number}, ${content.title}, for ${raceClass.name}. It counts ${from}.`,
              `Reason: ${content.reason}`,
              `As declared, ${engine.name} would then no longer comply:`,
              ...results.map((one) => `Clause ${one.clause}, ${one.heading}: ${one.sentence}`),
            ],
            link: {
              label: 'Read the bulletin',
              path: `/series/${series.slug}/rulebooks/${raceClass.slug}/bulletins/${content.number}`,
            },
          });
        }
      }
      return ok({
        number: content.number,
        hash,
        affected: checked.affected.map((engine) => engine.id),
      });
    },
  );
};
