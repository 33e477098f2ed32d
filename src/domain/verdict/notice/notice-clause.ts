import { convert } from '../../quantity/convert';
import { asciiIn } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import type { Clause } from '../../rulebook/clause';
import { decisionOf } from '../../rulebook/evaluate/decision-of';
import { getQuantityEntry, isQuantityName } from '../../rulebook/quantity-catalogue';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import type { ReportFinding, ReportPosition, ReportView } from '../report-view';
import type { NoticeClause, NoticeLimits, NoticePosition, NoticeReading } from './notice';

/** The positions that fail; where none does, those that have a number or answer and no pass. */
export const positionsAtFault = (finding: ReportFinding): readonly ReportPosition[] => {
  const failed = finding.perPosition.filter(({ pass }) => pass === false);
  return failed.length > 0
    ? failed
    : finding.perPosition.filter(
        ({ pass, value, answer }) => pass === null && (value !== undefined || answer !== undefined),
      );
};

type Reading = ReportView['readings'][number];

const keyOf = ({ cylinder, valve, index }: Reading['place']): string =>
  [cylinder, valve, ...(index === undefined ? [] : [index])]
    .filter((part) => part !== '')
    .join(' ');

/** The readings that a finding stands on at one position, in the report's order. */
export const readingsAt = (
  report: Pick<ReportView, 'readings'>,
  finding: Pick<ReportFinding, 'readings'>,
  position: string,
): readonly Reading[] =>
  report.readings.filter(
    ({ row, place, state }) =>
      state === 'counts' &&
      finding.readings.includes(row.id) &&
      (position === 'engine' || position === 'car' || keyOf(place) === position),
  );

const reading = ({ row }: Reading): NoticeReading => ({
  label: isQuantityName(row.quantity) ? getQuantityEntry(row.quantity).label : row.quantity,
  depth: row.depth,
  axis: row.axis,
  value: row.value,
});

const position = (
  report: ReportView,
  finding: ReportFinding,
  at: ReportPosition,
): NoticePosition => ({
  position: at.position,
  state: at.state,
  pass: at.pass,
  value: at.value,
  uncertainty: at.uncertainty,
  k: at.coverageFactor,
  budget: at.budget,
  answer: at.answer,
  sentence: at.sentence,
  readings: readingsAt(report, finding, at.position).map(reading),
});

const limitsOf = ({ requirement }: Clause, [first]: readonly ReportPosition[]) => {
  if (requirement?.kind !== 'limit') return undefined;
  const { min, max } = decisionOf(requirement).limits;
  const written = [requirement.min, requirement.max, requirement.nominal?.size]
    .filter((limit) => limit?.unit === requirement.unit)
    .map((limit) => decimalsOf(limit?.text ?? ''));
  // Where it is printed beside "0.0010 in" in the clause, the limit keeps its zero.
  const bound = (quantity: NonNullable<typeof min>) => {
    const { text, unit } = convert(quantity, requirement.unit);
    const places = Math.max(decimalsOf(text), ...written);
    return { text: asciiIn(quantity, unit, places), unit };
  };
  const kind = requirement.decisionRule.kind === 'guarded-rejection' ? 'rejection' : 'acceptance';
  const limits: NoticeLimits = {
    min: min && bound(min),
    max: max && bound(max),
    guard: first?.guardBand && { kind, width: first.guardBand },
  };
  return limits;
};

const measuredOf = ({ requirement }: Clause): string | undefined =>
  requirement !== undefined && 'quantity' in requirement
    ? getQuantityEntry(requirement.quantity).label
    : undefined;

/** One breached clause as it was in force, with what was found at the positions at fault. */
export const noticeClause = (
  rules: Pick<RulesInForce, 'sources' | 'edition'>,
  clause: Clause,
  report: ReportView,
  finding: ReportFinding,
): NoticeClause => {
  const source = rules.sources.find((row) => row.clause === clause.number);
  const positions = positionsAtFault(finding);
  return {
    number: clause.number,
    heading: clause.heading,
    words: clause.words,
    edition: String(source?.edition ?? rules.edition),
    bulletin: source?.bulletin === undefined ? undefined : String(source.bulletin),
    measured: measuredOf(clause),
    limit: finding.limit,
    limits: limitsOf(clause, positions),
    decisionRule: positions.find(({ rule }) => rule !== undefined)?.rule,
    positions: positions.map((at) => position(report, finding, at)),
  };
};
