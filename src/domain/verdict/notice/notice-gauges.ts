import type { ReportFinding, ReportView } from '../report-view';
import type { NoticeGauge } from './notice';
import { positionsAtFault, readingsAt } from './notice-clause';

/** The gauges behind the readings that a notice shows, rings included, with the zeros of their runs. */
export const noticeGauges = (
  report: ReportView,
  findings: readonly ReportFinding[],
): readonly NoticeGauge[] => {
  const rows = findings
    .flatMap((finding) =>
      positionsAtFault(finding).flatMap(({ position }) => readingsAt(report, finding, position)),
    )
    .map(({ row }) => row);
  const runs = new Set(rows.flatMap((row) => row.zeroRunId ?? []));
  const zeros = report.zeros.filter((zero) => runs.has(zero.runId));
  const used = new Set([
    ...rows.map((row) => row.gaugeId),
    ...zeros.flatMap((zero) => zero.ringId ?? []),
  ]);
  return report.gauges
    .filter((gauge) => used.has(gauge.id))
    .map((gauge) => ({
      code: gauge.code,
      kind: gauge.kind,
      range: gauge.range,
      certificate: gauge.certificate?.number,
      calibratedOn: gauge.calibratedOn,
      dueOn: gauge.dueOn,
      zeros: zeros
        .filter((zero) => zero.gaugeId === gauge.id && zero.kind === 'opening')
        .map((opening) => ({
          before: opening.reading,
          after: zeros.find(
            (zero) =>
              zero.runId === opening.runId && zero.gaugeId === gauge.id && zero.kind === 'closing',
          )?.reading,
        })),
    }));
};
