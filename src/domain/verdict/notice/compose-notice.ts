import { deadlineFrom } from '../../deadline/deadline';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import { computedStatement } from '../computed-statement';
import { type DecisionDraft, penaltyWords } from '../decision';
import type { ReportView } from '../report-view';
import type { NoticeDocument, NoticePenalty } from './notice';
import { noticeClause } from './notice-clause';
import { noticeGauges } from './notice-gauges';
import { type Named, noticePeople } from './notice-people';

/** Everything a notice is made from; only a part of it becomes public. */
export interface NoticeParts {
  readonly number: string;
  /** ISO 8601 instant of publication, in UTC. */
  readonly at: string;
  readonly series: NoticeDocument['series'] & {
    readonly appealDays: number;
    readonly appealsAddress: string;
    readonly bondMinor: string;
    readonly currency: string;
  };
  readonly season: string;
  readonly className: string;
  readonly event: NoticeDocument['event'] & { readonly protestMinutes: number };
  readonly car: string;
  readonly rules: RulesInForce;
  /** SHA-256 in hexadecimal, as is the report's. */
  readonly rulesHash: string;
  readonly report: ReportView;
  readonly reportRevision: number;
  readonly reportHash: string;
  readonly draft: DecisionDraft;
  readonly decidedBy: Named;
  readonly nameOf: (personId: string) => Named | undefined;
}

const penaltyOf = ({ draft, rules, series }: NoticeParts): NoticePenalty | undefined => {
  const row = rules.penalties.find(({ row }) => row === draft.penalty?.row);
  if (draft.decision !== 'breach' || row === undefined || draft.penalty === null) return undefined;
  return {
    row: row.row,
    breach: row.breach,
    step: String(draft.penalty.step),
    words: penaltyWords(row, draft.penalty.step),
    money:
      draft.moneyMinor === null
        ? undefined
        : { minor: String(draft.moneyMinor), currency: series.currency },
  };
};

/**
 * The notice that competitor and public see. Of the report it takes the breached clauses' findings
 * and what those stand on; nothing of other clauses but their numbers, nothing of advisory ones.
 */
export const composeNotice = (parts: NoticeParts): NoticeDocument => {
  const { draft, rules, report, series, event, at } = parts;
  const breached = draft.decision === 'breach' ? draft.clauses : [];
  const named = report.findings.filter((finding) => breached.includes(finding.clause));
  // A window runs from the next full minute: it shuts on a minute that people can read off a clock.
  const from = new Date(Math.ceil(Date.parse(at) / 60_000) * 60_000).toISOString();
  const window = { kind: 'minutes', minutes: event.protestMinutes } as const;
  const appeal = { kind: 'end-of-day', days: series.appealDays } as const;
  const { protestMinutes: _, ...eventNamed } = event;
  const against = draft.againstComputedBecause.trim();
  return {
    document: 'tagwire/notice',
    version: '1',
    number: parts.number,
    series: { id: series.id, slug: series.slug, name: series.name },
    season: parts.season,
    className: parts.className,
    event: eventNamed,
    car: parts.car,
    decision: draft.decision,
    computed: computedStatement(report.findings),
    againstComputedBecause: against === '' ? undefined : against,
    reasons: draft.reasons.trim(),
    penalty: penaltyOf(parts),
    breached: named.flatMap((finding) => {
      const clause = rules.clauses.find(({ number }) => number === finding.clause);
      return clause === undefined ? [] : [noticeClause(rules, clause, report, finding)];
    }),
    checked: report.findings
      .filter((finding) => !finding.advisory && finding.pass !== null)
      .map(({ clause, heading }) => ({ number: clause, heading })),
    gauges: noticeGauges(report, named),
    people: noticePeople(report, named, { by: parts.decidedBy, at }, parts.nameOf),
    publishedAt: at,
    provisionalUntil: deadlineFrom(from, window, event.zone).endsAt,
    appeal: {
      until: deadlineFrom(at, appeal, event.zone).endsAt,
      address: series.appealsAddress,
      bond: { minor: series.bondMinor, currency: series.currency },
    },
    rules: {
      hash: parts.rulesHash,
      edition: String(rules.edition),
      bulletins: rules.bulletins.map(String),
    },
    report: {
      revision: String(parts.reportRevision),
      hash: parts.reportHash,
      signedAt: report.signedAt,
    },
  };
};
