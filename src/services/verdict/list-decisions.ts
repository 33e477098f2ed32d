import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../ports';

export interface DecisionListed {
  readonly inspectionId: string;
  readonly seriesId: string;
  readonly seriesSlug: string;
  readonly series: string;
  readonly carNumber: string;
  readonly className: string;
  readonly event: string;
  readonly state: string;
  readonly revision: number | null;
  readonly signedAt: string | null;
  readonly zone: string;
  readonly draftedBy: string | null;
  /** Notice on the latest revision of the report. */
  readonly number: string | null;
  readonly decision: 'breach' | 'no-breach' | null;
  readonly final: boolean;
}

/** Inspections of the series that the actor decides in: signed ones first, then those under way, then the decided. */
export const listDecisions = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly DecisionListed[]> => {
  const series = seriesWhere(actor, 'verdict.read-drafts');
  if (series.length === 0) return [];
  return deps.db.execute<DecisionListed[]>(
    `select i.id as "inspectionId", i.series_id as "seriesId", s.slug as "seriesSlug", s.name as series,
            e.car_number as "carNumber", c.name as "className", v.number || ', ' || v.track as event,
            i.state, r.revision,
            to_char(r.signed_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "signedAt",
            v.zone, case when d.published_at is null then p.name end as "draftedBy",
            w.number, w.decision, coalesce(w.provisional_until < ?, false) as final
     from public.inspection i
     join public.series s on s.id = i.series_id
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join public.class c on c.series_id = i.series_id and c.id = e.class_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     left join lateral (
       select revision, signed_at from record.report r
       where r.series_id = i.series_id and r.inspection_id = i.id order by revision desc limit 1
     ) r on true
     left join public.verdict_draft d on d.series_id = i.series_id and d.inspection_id = i.id
     left join public.person p on p.id = d.updated_by
     left join record.verdict w on w.series_id = i.series_id and w.inspection_id = i.id
       and w.report_revision = r.revision
     where i.series_id in (${series.map(() => '?').join(', ')})
     order by (w.id is not null), (r.revision is null), v.starts_at desc, c.name, e.car_number
     limit 500`,
    [deps.clock.now(), ...series],
  );
};
