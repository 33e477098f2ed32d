import type { Written } from '../quantity/dimension';
import { measurandWords } from '../rulebook/describe';
import { getQuantityEntry, isQuantityName } from '../rulebook/quantity-catalogue';
import type { RulesInForce } from '../rulebook/rules-in-force';
import type { NoticeClause, NoticeGauge, NoticePerson } from './notice/notice';
import { noticeClause, positionsAtFault, readingsAt } from './notice/notice-clause';
import { noticeGauges } from './notice/notice-gauges';
import { type Named, noticePeople } from './notice/notice-people';
import type { ReportFinding, ReportView } from './report-view';

/** A reading behind a clause that is not complied with, with the gauge it was taken by. */
export interface FaultReading {
  readonly position: string;
  readonly label: string;
  readonly where: string;
  readonly value: Written;
  readonly gauge: string;
  readonly takenAt: string;
}

export interface ClauseAtFault {
  readonly clause: NoticeClause;
  /** Quantity, figure and datum: `Valve lift of each bore, largest, at the retainer, lash 0.000 in`. */
  readonly measurand: string;
  readonly readings: readonly FaultReading[];
  /** Checks of the gauges on a ring that night. */
  readonly checked: readonly string[];
}

/** What a signed report says is not complied with; instants in UTC, hashes hexadecimal. */
export interface NonCompliance {
  readonly series: string;
  readonly className: string;
  readonly event: string;
  readonly zone: string;
  readonly car: string;
  readonly competitor: string;
  readonly revision: string;
  readonly reason: string;
  readonly reportHash: string;
  readonly rulesHash: string;
  readonly signedAt: string;
  readonly clauses: readonly ClauseAtFault[];
  readonly gauges: readonly NoticeGauge[];
  readonly people: readonly NoticePerson[];
}

const readingsOf = (report: ReportView, finding: ReportFinding): readonly FaultReading[] =>
  positionsAtFault(finding).flatMap(({ position }) =>
    readingsAt(report, finding, position).map(({ row }) => ({
      position,
      label: isQuantityName(row.quantity) ? getQuantityEntry(row.quantity).label : row.quantity,
      where: [row.depth, row.axis].filter((part) => part !== '').join(', '),
      value: row.value,
      gauge: report.gauges.find(({ id }) => id === row.gaugeId)?.code ?? '–',
      takenAt: row.occurredAt,
    })),
  );

/**
 * The report of non-compliance: every mandatory clause that a signed report finds failed, with
 * quantity, datum, readings, uncertainty and gauges. Nothing where none failed.
 */
export const findNonCompliance = (
  report: ReportView,
  rules: RulesInForce,
  head: Omit<NonCompliance, 'clauses' | 'gauges' | 'people' | 'signedAt'>,
  nameOf: (personId: string) => Named | undefined,
): NonCompliance | undefined => {
  const failed = report.findings.filter(({ advisory, pass }) => !advisory && pass === false);
  if (failed.length === 0) return undefined;
  const people = noticePeople(report, failed, { by: { name: '' }, at: report.signedAt }, nameOf);
  return {
    ...head,
    signedAt: report.signedAt,
    clauses: failed.flatMap((finding): readonly ClauseAtFault[] => {
      const clause = rules.clauses.find(({ number }) => number === finding.clause);
      if (clause === undefined) return [];
      const { requirement } = clause;
      return [
        {
          clause: noticeClause(rules, clause, report, finding),
          measurand:
            requirement !== undefined && 'quantity' in requirement
              ? measurandWords(requirement)
              : '',
          readings: readingsOf(report, finding),
          checked: [...new Set(positionsAtFault(finding).flatMap(({ checked = [] }) => checked))],
        },
      ];
    }),
    gauges: noticeGauges(report, failed),
    people: people.filter(({ role }) => role !== 'decided'),
  };
};
