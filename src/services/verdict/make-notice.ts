import type { EntityManager } from '@mikro-orm/postgresql';
import type { DecisionDraft } from '@/domain/verdict/decision';
import { composeNotice } from '@/domain/verdict/notice/compose-notice';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { type DecisionCase, readNames, type SignedReport } from './find-case';

/** The one way from a decision to its notice: for the preview and for publishing alike. */
export const makeNotice = async (
  em: EntityManager,
  found: DecisionCase & { readonly report: SignedReport },
  draft: DecisionDraft,
  publication: { readonly number: string; readonly at: Date; readonly decidedBy: string },
): Promise<NoticeDocument> => {
  const { head, report } = found;
  const decidedBy = (await readNames(em, [publication.decidedBy])).get(publication.decidedBy);
  if (decidedBy === undefined) throw new Error('The person who decides is not on record.');
  return composeNotice({
    number: publication.number,
    at: publication.at.toISOString(),
    series: {
      id: head.seriesId,
      slug: head.seriesSlug,
      name: head.seriesName,
      appealDays: head.appealDays,
      appealsAddress: head.appealsAddress,
      bondMinor: head.bondMinor,
      currency: head.currency,
    },
    season: head.seasonName,
    className: head.className,
    event: {
      number: String(head.eventNumber),
      slug: head.eventSlug,
      name: head.eventName,
      track: head.track,
      startsAt: head.startsAt,
      zone: head.zone,
      protestMinutes: head.protestMinutes,
    },
    car: head.carNumber,
    rules: found.rules,
    rulesHash: found.rulesHash,
    report: report.document,
    reportRevision: report.revision,
    reportHash: report.hash,
    draft,
    decidedBy,
    nameOf: (personId) => found.names.get(personId),
  });
};

/** `2026-041` */
export const noticeNumber = (seasonSlug: string, count: number): string =>
  `${seasonSlug}-${String(count).padStart(3, '0')}`;
