import type { ReportFinding, ReportView } from '../report-view';
import type { NoticePerson } from './notice';
import { positionsAtFault, readingsAt } from './notice-clause';

export interface Named {
  readonly name: string;
  readonly latinName?: string | undefined;
}

const OUTCOME = { signed: 'signed', refused: 'refused to sign', absent: '' } as const;

const second = (
  report: ReportView,
  findings: readonly ReportFinding[],
  nameOf: (personId: string) => Named | undefined,
): readonly NoticePerson[] => {
  const rows = findings
    .flatMap((finding) =>
      positionsAtFault(finding).flatMap(({ position }) => readingsAt(report, finding, position)),
    )
    .map(({ row }) => row)
    .filter((row) => row.set !== '1');
  const last = new Map(rows.map((row) => [row.takenBy, row]));
  return [...last].flatMap(([personId, row]): readonly NoticePerson[] => {
    const named = nameOf(personId);
    const standing =
      personId === report.inspector.id ? 'inspector; a repeat by the same person' : 'inspector';
    return named === undefined
      ? []
      : [{ role: 'second-reading', ...named, standing, at: row.occurredAt }];
  });
};

/** Who found, read again, stood by and decided, each with the time. */
export const noticePeople = (
  report: ReportView,
  findings: readonly ReportFinding[],
  decided: { readonly by: Named; readonly at: string },
  nameOf: (personId: string) => Named | undefined,
): readonly NoticePerson[] => {
  const { witness, inspector, signedAt } = report;
  const witnessed = report.remarks.filter(({ kind }) => kind === 'witness').at(-1);
  const finder = nameOf(inspector.id) ?? { name: inspector.name };
  return [
    { role: 'found', ...finder, standing: 'inspector', at: signedAt },
    ...second(report, findings, nameOf),
    ...(witness.outcome === 'absent'
      ? []
      : [
          {
            role: 'witness',
            name: witness.name,
            standing: [witness.role, OUTCOME[witness.outcome]].filter(Boolean).join('; '),
            at: witnessed?.occurredAt ?? signedAt,
          } as const,
        ]),
    { role: 'decided', ...decided.by, standing: 'series official', at: decided.at },
  ];
};
