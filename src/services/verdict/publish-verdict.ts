import { LockMode } from '@mikro-orm/core';
import type { EntityManager } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid, stale } from '@/domain/failure';
import { findHex, sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { computedStatement } from '@/domain/verdict/computed-statement';
import { type DecisionDraft, decisionFaults } from '@/domain/verdict/decision';
import { VerdictDraft } from '@/entities/event/verdict-draft';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { decisionDocument } from './decision-document';
import { findCase } from './find-case';
import { makeNotice, noticeNumber } from './make-notice';
import { refusal } from './refusal';

export interface PublishedVerdict {
  readonly verdictId: string;
  readonly number: string;
}

/** The next number of the season's notices; its row stays locked through the commit. */
const takeNumber = async (em: EntityManager, seriesId: string, seasonId: string) => {
  const [row] = await em.execute<{ last: number }[]>(
    `insert into public.notice_counter (series_id, season_id, last) values (?, ?, 1)
     on conflict (series_id, season_id) do update set last = public.notice_counter.last + 1
     returning last`,
    [seriesId, seasonId],
  );
  return Number(row?.last);
};

/**
 * Publishes the decision as it stands in the draft of this version: verdict, numbered notice and
 * ledger line in one act. Of two officials at once one is first; the other is told the number.
 */
export const publishVerdict = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly inspectionId: string;
    readonly version: number;
  },
): Promise<Result<PublishedVerdict, Failure>> => {
  const { act, seriesId, inspectionId, version } = input;
  if (!may(actor, 'verdict.decide', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'publish-verdict', seriesId, input: { inspectionId, version } },
    async ({ em, at, append, line, send }) => {
      const kept = await em.findOne(
        VerdictDraft,
        { seriesId, inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const found = await findCase(em, seriesId, inspectionId);
      if (kept === null || found === undefined) return fail(absent());
      const refused = refusal(found, actor.personId);
      if (refused !== undefined) return fail(refused);
      const { head, report, rules } = found;
      const draft = kept.content as unknown as DecisionDraft;
      if (report === undefined || kept.version !== version) return fail(stale());
      if (draft.reportRevision !== report.revision) return fail(stale());
      const { findings } = report.document;
      const faults = decisionFaults(draft, rules, findings);
      if (faults.length > 0) return fail(invalid(faults));

      const number = noticeNumber(head.seasonSlug, await takeNumber(em, seriesId, head.seasonId));
      const decidedBy = actor.personId;
      const notice = await makeNotice(em, { ...found, report }, draft, { number, at, decidedBy });
      const noticeText = canonicalJson(toDocument(notice));
      const verdictId = deps.random.uuid();
      const decision = decisionDocument(found, { verdictId, notice, draft, decidedBy: actor });
      kept.publishedAt = at;
      append('verdict', [
        {
          series_id: seriesId,
          id: verdictId,
          number,
          entry_id: head.entryId,
          inspection_id: inspectionId,
          report_revision: report.revision,
          decision: draft.decision,
          computed: computedStatement(findings),
          reasons: notice.reasons,
          penalty: notice.penalty?.words ?? '',
          penalty_money_minor: draft.moneyMinor,
          against_computed_because: notice.againstComputedBecause ?? '',
          document: decision,
          hash: sha256(utf8(decision)),
          notice: noticeText,
          notice_hash: sha256(utf8(noticeText)),
          rules_hash: findHex(found.rulesHash, 32),
          decided_by: decidedBy,
          published_at: notice.publishedAt,
          provisional_until: notice.provisionalUntil,
        },
      ]);
      send('render-notice', { seriesId, verdictId });
      line({
        seriesId,
        kind: 'verdict-published',
        contents: {
          notice: { text: noticeText, open: true },
          decision: { text: decision, open: false },
        },
        refs: { verdict: verdictId, report: report.hash, rules: found.rulesHash },
      });
      return ok({ verdictId, number });
    },
  );
};
