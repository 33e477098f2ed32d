import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { findNonCompliance, type NonCompliance } from '@/domain/verdict/non-compliance';
import type { Ports } from '../../ports';
import { findCase } from '../../verdict/find-case';
import { findInspectionRow } from '../read/find-inspection';

/** An inspection's last signed report as a report of non-compliance; `null` where nothing failed. */
export interface SignedNonCompliance {
  readonly carNumber: string;
  readonly event: string;
  readonly className: string;
  /** Of the signed report; nothing while there is none. */
  readonly revision: number | null;
  readonly sheet: NonCompliance | null;
}

/** For whoever may read inspections of the series. */
export const findSignedNonCompliance = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  inspectionId: string,
): Promise<Result<SignedNonCompliance, Failure>> => {
  const row = await findInspectionRow(deps.db, actor, 'inspection.read', inspectionId);
  const found = row && (await findCase(deps.db, row.seriesId, inspectionId));
  if (!found) return fail(absent());
  const { head, report, rules, rulesHash, names } = found;
  const base = { carNumber: head.carNumber, event: head.eventName, className: head.className };
  if (report === undefined) return ok({ ...base, revision: null, sheet: null });
  const [last] = await deps.db.execute<{ reason: string }[]>(
    'select reason from record.report where series_id = ? and inspection_id = ? and revision = ?',
    [head.seriesId, inspectionId, report.revision],
  );
  const sheet = findNonCompliance(
    report.document,
    rules,
    {
      series: head.seriesName,
      className: head.className,
      event: `event ${head.eventNumber}, ${head.track}`,
      zone: head.zone,
      car: head.carNumber,
      competitor: head.competitorName,
      revision: String(report.revision),
      reason: last?.reason ?? '',
      reportHash: report.hash,
      rulesHash,
    },
    (personId) => names.get(personId),
  );
  return ok({ ...base, revision: report.revision, sheet: sheet ?? null });
};
