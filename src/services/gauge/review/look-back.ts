import type { EntityManager } from '@mikro-orm/postgresql';
import {
  type Doubt,
  findingsThatRelied,
  needsReview,
  type ReliedFinding,
} from '@/domain/verdict/look-back';
import { readReport } from '@/domain/verdict/report-view';

/** A signed report with findings on readings in doubt, and the verdict on it, where there is one. */
export interface ReliedReport {
  readonly inspectionId: string;
  readonly carNumber: string;
  readonly className: string;
  readonly event: string;
  readonly revision: number;
  readonly findings: readonly ReliedFinding[];
  readonly verdict: {
    readonly id: string;
    readonly number: string;
    readonly decision: 'breach' | 'no-breach';
    /** Of a mandatory finding in doubt: only then is the verdict reviewed. */
    readonly reviewed: boolean;
  } | null;
}

/** A check without teardown that stands on the gauge: neither taken back nor corrected to another. */
export interface ReliedCheck {
  readonly carNumber: string;
  readonly clause: string;
  readonly event: string;
  readonly state: string;
}

export interface LookBack {
  readonly reports: readonly ReliedReport[];
  /** Inspections with readings in doubt that nobody has signed yet: they count there no more. */
  readonly unsigned: readonly { readonly inspectionId: string; readonly carNumber: string }[];
  readonly checks: readonly ReliedCheck[];
}

interface Row {
  readonly inspectionId: string;
  readonly carNumber: string;
  readonly className: string;
  readonly event: string;
  readonly revision: number | null;
  readonly document: string | null;
  readonly verdict: string | null;
  readonly number: string | null;
  readonly decision: 'breach' | 'no-breach' | null;
}

/**
 * Everything that stands on what a gauge read in doubt, from the rows: inspections by the readings'
 * gauge and the zeros' ring, then the newest report of each and every report that a verdict rests on.
 */
export const lookBack = async (
  em: EntityManager,
  seriesId: string,
  doubt: Doubt,
): Promise<LookBack> => {
  const after = doubt.after ?? '-infinity';
  const window = [seriesId, doubt.gaugeId, after, doubt.until];
  const during = `r.occurred_at + r.clock_offset_ms * interval '1 millisecond' > ?::timestamptz
    and r.occurred_at + r.clock_offset_ms * interval '1 millisecond' <= ?::timestamptz`;
  const rows = await em.execute<Row[]>(
    `with relied as (
       select distinct r.inspection_id from record.reading r
       where r.series_id = ? and r.gauge_id = ? and ${during}
       union
       select distinct r.inspection_id from record.reading r
       join record.zero z on z.series_id = r.series_id and z.run_id = r.zero_run_id
       where r.series_id = ? and z.ring_id = ? and ${during}
     )
     select i.id as "inspectionId", e.car_number as "carNumber", c.name as "className",
            v.name as event, p.revision, p.document, w.id as verdict, w.number, w.decision
     from relied x
     join public.inspection i on i.series_id = ? and i.id = x.inspection_id
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     left join record.report p on p.series_id = i.series_id and p.inspection_id = i.id
     left join record.verdict w on w.series_id = p.series_id and w.inspection_id = p.inspection_id
       and w.report_revision = p.revision
     where p.revision is null or w.id is not null or p.revision = (
       select max(l.revision) from record.report l
       where l.series_id = p.series_id and l.inspection_id = p.inspection_id)
     order by v.starts_at desc, e.car_number, p.revision desc`,
    [...window, ...window, seriesId],
  );
  const reports = rows.flatMap((row): readonly ReliedReport[] => {
    if (row.document === null || row.revision === null) return [];
    const read = readReport(row.document);
    if (!read.ok) throw new Error(read.failure.detail);
    const findings = findingsThatRelied(read.value, doubt);
    if (findings.length === 0) return [];
    const { inspectionId, carNumber, className, event, revision, verdict, number, decision } = row;
    return [
      {
        inspectionId,
        carNumber,
        className,
        event,
        revision,
        findings,
        verdict:
          verdict === null || number === null || decision === null
            ? null
            : { id: verdict, number, decision, reviewed: needsReview(findings) },
      },
    ];
  });
  return {
    reports,
    unsigned: rows
      .filter(({ revision }) => revision === null)
      .map(({ inspectionId, carNumber }) => ({ inspectionId, carNumber })),
    checks: await em.execute<ReliedCheck[]>(
      `select e.car_number as "carNumber", k.clause, v.name as event, k.state
       from (select distinct on (entry_id, clause) * from record.event_check where series_id = ?
             order by entry_id, clause, received_at desc, id desc) k
       join public.entry e on e.series_id = k.series_id and e.id = k.entry_id
       join public.event v on v.series_id = k.series_id and v.id = k.event_id
       where k.series_id = ? and k.gauge_id = ? and k.taken_at > ?::timestamptz
         and k.taken_at <= ?::timestamptz and k.state <> 'taken-back'
       order by k.taken_at, k.id`,
      [seriesId, ...window],
    ),
  };
};
