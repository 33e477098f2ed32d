import type { ReportFinding, ReportView } from './report-view';

/** What a gauge read between two instants in UTC is in doubt; without `after`, from the beginning. */
export interface Doubt {
  readonly gaugeId: string;
  readonly after?: string | undefined;
  readonly until: string;
}

export interface ReliedFinding {
  readonly clause: string;
  readonly heading: string;
  readonly state: ReportFinding['state'];
  readonly pass: boolean | null;
  readonly advisory: boolean;
  /** How many of its readings are in doubt. */
  readonly readings: number;
}

/**
 * The findings of a signed report that stand on a reading in doubt: one by the gauge itself, or one
 * whose run was zeroed on it where it is a ring.
 */
export const findingsThatRelied = (
  report: Pick<ReportView, 'readings' | 'zeros' | 'findings'>,
  { gaugeId, after, until }: Doubt,
): readonly ReliedFinding[] => {
  const runs = new Set(
    report.zeros.filter(({ ringId }) => ringId === gaugeId).map(({ runId }) => runId),
  );
  const inDoubt = new Set(
    report.readings
      .filter(({ row }) => {
        const at = Date.parse(row.occurredAt);
        const during = at <= Date.parse(until) && (after === undefined || at > Date.parse(after));
        return (
          during &&
          (row.gaugeId === gaugeId || (row.zeroRunId !== undefined && runs.has(row.zeroRunId)))
        );
      })
      .map(({ row }) => row.id),
  );
  return report.findings.flatMap((finding) => {
    const readings = finding.readings.filter((id) => inDoubt.has(id)).length;
    const { clause, heading, state, pass, advisory } = finding;
    return readings === 0 ? [] : [{ clause, heading, state, pass, advisory, readings }];
  });
};

/** A verdict is reviewed where a finding that could carry it is in doubt; advisory ones carry none. */
export const needsReview = (findings: readonly ReliedFinding[]): boolean =>
  findings.some(({ advisory }) => !advisory);
