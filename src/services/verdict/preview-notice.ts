import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { type DecisionDraft, decisionFaults } from '@/domain/verdict/decision';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { NoticeCounter } from '@/entities/event/notice-counter';
import { VerdictDraft } from '@/entities/event/verdict-draft';
import type { Ports } from '../ports';
import { findCase } from './find-case';
import { makeNotice, noticeNumber } from './make-notice';
import { refusal } from './refusal';

export interface NoticePreview {
  /** As it would be published now; number and times are given when it is. */
  readonly notice: NoticeDocument;
  readonly version: number;
  /** What still keeps it from being published. */
  readonly faults: readonly Fault[];
}

/** Exactly what competitor and public will see, made from the draft by the function that publishes. */
export const previewNotice = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: { readonly seriesId: string; readonly inspectionId: string },
): Promise<Result<NoticePreview, Failure>> => {
  const { seriesId, inspectionId } = input;
  if (!may(actor, 'verdict.decide', seriesId)) return fail(absent());
  const found = await findCase(deps.db, seriesId, inspectionId);
  const kept = await deps.db.findOne(VerdictDraft, { seriesId, inspectionId });
  if (found === undefined || kept === null) return fail(absent());
  const refused = refusal(found, actor.personId);
  if (refused !== undefined) return fail(refused);
  const { head, report, rules } = found;
  const draft = kept.content as unknown as DecisionDraft;
  if (report === undefined || draft.reportRevision !== report.revision) return fail(stale());
  const counter = await deps.db.findOne(NoticeCounter, { seriesId, seasonId: head.seasonId });
  const notice = await makeNotice(deps.db, { ...found, report }, draft, {
    number: noticeNumber(head.seasonSlug, (counter?.last ?? 0) + 1),
    at: deps.clock.now(),
    decidedBy: actor.personId,
  });
  const faults = decisionFaults(draft, rules, report.document.findings);
  return ok({ notice, version: kept.version, faults });
};
