import type { EntityManager } from '@mikro-orm/postgresql';

export type ReviewState = 'open' | 'stands' | 'decide-again';

/** A verdict under review for a gauge that was found bad. Instants are ISO 8601 in UTC. */
export interface Review {
  readonly reviewId: string;
  readonly seriesId: string;
  readonly seriesSlug: string;
  readonly faultId: string;
  readonly gaugeId: string;
  readonly gauge: string;
  readonly notice: string;
  readonly inspectionId: string;
  readonly carNumber: string;
  readonly decision: 'breach' | 'no-breach';
  readonly zone: string;
  readonly openedAt: string;
  readonly state: ReviewState;
  readonly public: boolean;
  readonly reason: string | null;
  readonly endedBy: string | null;
  readonly endedAt: string | null;
}

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

/** Reviews that a condition on `o` (the act that opened them) names, open ones first. */
export const readReviews = (
  em: EntityManager,
  condition: string,
  values: readonly unknown[],
): Promise<readonly Review[]> =>
  em.execute<Review[]>(
    `select o.review_id as "reviewId", o.series_id as "seriesId", s.slug as "seriesSlug",
            o.fault_id as "faultId", g.id as "gaugeId", g.code as gauge, v.number as notice,
            v.inspection_id as "inspectionId", e.car_number as "carNumber", v.decision, x.zone,
            ${iso('o.acted_at')} as "openedAt", coalesce(d.kind, 'open') as state,
            exists (select from record.review_act p where p.series_id = o.series_id
              and p.review_id = o.review_id and p.kind = 'made-public') as public,
            d.reason, b.name as "endedBy", ${iso('d.acted_at')} as "endedAt"
     from record.review_act o
     join record.gauge_fault f on f.series_id = o.series_id and f.id = o.fault_id
     join public.gauge g on g.series_id = f.series_id and g.id = f.gauge_id
     join record.verdict v on v.series_id = o.series_id and v.id = o.verdict_id
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     join public.event x on x.series_id = e.series_id and x.id = e.event_id
     join public.series s on s.id = o.series_id
     left join record.review_act d on d.series_id = o.series_id and d.review_id = o.review_id
       and d.kind in ('stands', 'decide-again')
     left join public.person b on b.id = d.recorded_by
     where o.kind = 'opened' and ${condition}
     order by (d.id is not null), o.acted_at desc, v.number`,
    [...values],
  );
