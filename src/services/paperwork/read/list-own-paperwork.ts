import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { PaperworkState } from '@/domain/paperwork/state';
import type { Ports } from '../../ports';
import { isoOf } from './read-row';

export interface OwnPaperworkRow {
  readonly id: string;
  readonly seriesName: string;
  readonly className: string;
  readonly seasonName: string;
  readonly carNumber: string;
  readonly reference: string;
  readonly state: PaperworkState;
  readonly versions: number;
  readonly updatedAt: string;
  readonly zone: string;
  /** Remarks on the version last decided. */
  readonly remarks: number;
  /** The next event of the season that has not begun; nothing while none is set. */
  readonly dueAt: string | null;
  readonly dueEvent: string | null;
}

/** All paperwork of the actor's own, what needs doing first. */
export const listOwnPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly OwnPaperworkRow[]> => {
  const open = seriesWhere(actor, 'paperwork.hand-in');
  return deps.db.execute<OwnPaperworkRow[]>(
    `select p.id, s.name as "seriesName", c.name as "className", n.name as "seasonName",
       p.car_number as "carNumber", e.reference, p.state, p.versions, s.zone,
       ${isoOf('p.updated_at')} as "updatedAt",
       coalesce(jsonb_array_length(d.remarks), 0) as remarks,
       ${isoOf('x.starts_at')} as "dueAt", x.name as "dueEvent"
     from public.paperwork p
     join public.series s on s.id = p.series_id
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.season n on n.series_id = c.series_id and n.id = c.season_id
     join public.engine e on e.id = p.engine_id
     left join record.paperwork_decision d on d.series_id = p.series_id
       and d.paperwork_id = p.id and d.number = p.versions
     left join lateral (
       select v.starts_at, v.name from public.event v
       where v.series_id = p.series_id and v.season_id = c.season_id and v.starts_at > ?
       order by v.starts_at limit 1
     ) x on true
     where p.competitor_id = ? and p.series_id = any(?::uuid[])
     order by array_position(array['returned', 'draft', 'handed-in', 'accepted', 'withdrawn'], p.state),
       p.updated_at desc`,
    [deps.clock.now(), actor.personId, `{${open.join(',')}}`],
  );
};

export interface OwnVerdictRow {
  readonly number: string;
  readonly seriesSlug: string;
  readonly carNumber: string;
  readonly eventName: string;
  readonly decision: 'breach' | 'no-breach';
  readonly publishedAt: string;
  readonly provisionalUntil: string;
  readonly zone: string;
}

/** Verdicts published on the actor's own entries, newest first. */
export const listOwnVerdicts = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly OwnVerdictRow[]> =>
  deps.db.execute<OwnVerdictRow[]>(
    `select v.number, s.slug as "seriesSlug", n.car_number as "carNumber", x.name as "eventName",
       v.decision, ${isoOf('v.published_at')} as "publishedAt",
       ${isoOf('v.provisional_until')} as "provisionalUntil", x.zone
     from record.verdict v
     join public.entry n on n.series_id = v.series_id and n.id = v.entry_id
     join public.event x on x.series_id = n.series_id and x.id = n.event_id
     join public.series s on s.id = v.series_id
     where n.competitor_id = ? order by v.published_at desc limit 20`,
    [actor.personId],
  );

export interface OpenClass {
  readonly seriesId: string;
  readonly seriesName: string;
  readonly classId: string;
  readonly className: string;
  readonly seasonName: string;
}

/** Classes with a published rulebook in the series where the actor may hand in. */
export const listOpenClasses = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly OpenClass[]> => {
  const open = seriesWhere(actor, 'paperwork.hand-in');
  return deps.db.execute<OpenClass[]>(
    `select c.series_id as "seriesId", s.name as "seriesName", c.id as "classId",
       c.name as "className", n.name as "seasonName"
     from public.class c
     join public.season n on n.series_id = c.series_id and n.id = c.season_id
     join public.series s on s.id = c.series_id
     where c.series_id = any(?::uuid[]) and exists (
       select 1 from record.rule_publication r
       where r.series_id = c.series_id and r.class_id = c.id and r.kind = 'edition'
     )
     order by s.name, n.starts_on desc, c.name`,
    [`{${open.join(',')}}`],
  );
};
