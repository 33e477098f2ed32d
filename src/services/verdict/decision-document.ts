import type { Actor } from '@/domain/access/permission';
import { canonicalJson } from '@/domain/ledger/canonical';
import { toDocument } from '@/domain/rulebook/document';
import type { DecisionDraft } from '@/domain/verdict/decision';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import type { DecisionCase } from './find-case';

/** The whole decision as canonical text, for the parties and the panel; the notice is its public part. */
export const decisionDocument = (
  { head, report }: DecisionCase,
  decided: {
    readonly verdictId: string;
    readonly notice: NoticeDocument;
    readonly draft: DecisionDraft;
    readonly decidedBy: Pick<Actor, 'personId' | 'name'>;
  },
): string => {
  const { verdictId, notice, draft, decidedBy } = decided;
  return canonicalJson(
    toDocument({
      document: 'tagwire/verdict',
      version: '1',
      number: notice.number,
      verdict: verdictId,
      inspection: head.inspectionId,
      entry: head.entryId,
      competitor: head.competitorName,
      decidedBy: { id: decidedBy.personId, name: decidedBy.name },
      decidedAt: notice.publishedAt,
      draft,
      computed: notice.computed,
      statements: report?.document.findings.map(({ clause, pass, state }) => ({
        clause,
        pass,
        state,
      })),
      rules: notice.rules,
      report: notice.report,
    }),
  );
};
