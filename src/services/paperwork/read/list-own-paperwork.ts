import { openings } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import type { OwnPaperworkRow, OwnVerdictRow } from '@/domain/paddock/paddock-rows';
import type { Ports } from '../../ports';
import { verdictsOpenTo } from '../../verdict/verdicts-open-to';
import { openTo } from '../own-paperwork';
import { isoOf } from './read-row';

/** All paperwork of the actor's own and what others open to them, what needs doing first. */
export const listOwnPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly OwnPaperworkRow[]> => {
  const open = openTo(actor, 'see');
  return deps.db.execute<OwnPaperworkRow[]>(
    `select p.id, p.competitor_id as "competitorId", o.name as "competitorName",
       p.series_id as "seriesId", p.engine_id as "engineId", p.class_id as "classId", s.name as "seriesName", c.name as "className", n.name as "seasonName",
       p.car_number as "carNumber", e.reference, p.state, p.versions, s.zone,
       ${isoOf('p.updated_at')} as "updatedAt",
       coalesce(jsonb_array_length(d.remarks), 0) as remarks,
       ${isoOf('x.starts_at')} as "dueAt", x.name as "dueEvent"
     from public.paperwork p
     join public.series s on s.id = p.series_id
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.season n on n.series_id = c.series_id and n.id = c.season_id
     join public.engine e on e.id = p.engine_id
     join public.person o on o.id = p.competitor_id
     left join record.paperwork_decision d on d.series_id = p.series_id
       and d.paperwork_id = p.id and d.number = p.versions
     left join lateral (
       select v.starts_at, v.name from public.event v
       where v.series_id = p.series_id and v.season_id = c.season_id and v.starts_at > ?
       order by v.starts_at limit 1
     ) x on true
     where ${open.sql}
     order by array_position(array['returned', 'draft', 'handed-in', 'accepted', 'withdrawn'], p.state),
       p.updated_at desc`,
    [deps.clock.now(), ...open.parameters],
  );
};

/** Verdicts published on the actor's own entries, newest first. */
export const listOwnVerdicts = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly OwnVerdictRow[]> => {
  const open = verdictsOpenTo(actor);
  return deps.db.execute<OwnVerdictRow[]>(
    `select v.number, s.slug as "seriesSlug", e.competitor_id as "competitorId",
       p.engine_id as "engineId", e.event_id as "eventId", e.car_number as "carNumber", x.name as "eventName",
       v.decision, ${isoOf('v.published_at')} as "publishedAt",
       ${isoOf('v.provisional_until')} as "provisionalUntil", x.zone
     from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     join public.event x on x.series_id = e.series_id and x.id = e.event_id
     join public.series s on s.id = v.series_id
     left join public.inspection i on i.series_id = v.series_id and i.id = v.inspection_id
     left join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
     where ${open.sql} order by v.published_at desc limit 20`,
    [...open.parameters],
  );
};

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
  const open = [...new Set(openings(actor, 'answers').flatMap(({ seriesIds }) => seriesIds))];
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
