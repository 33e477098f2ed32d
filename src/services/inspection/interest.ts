import type { EntityManager } from '@mikro-orm/postgresql';
import type { Entry } from '@/entities/event/entry';
import type { Inspection } from '@/entities/event/inspection';

interface Found {
  readonly person_id: string;
  readonly why: string;
}

/**
 * Who has an interest in an inspected car, and which: nobody inspects the car they enter, the engine
 * they own, paperwork they handed in, a class they run in at the same event or have an engine
 * declared in, nor a car or competitor with whom an interest of theirs was declared. One set-based
 * query.
 */
const interests = async (
  em: EntityManager,
  seriesId: string,
  which: 'i' | 'e',
  id: string,
): Promise<ReadonlyMap<string, string>> => {
  const rows = await em.execute<Found[]>(
    `with inspected as (
       select e.series_id, e.event_id, e.class_id, e.competitor_id, e.car_number,
              coalesce(i.paperwork_id, e.paperwork_id) as paperwork_id
       from public.entry e
       left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
       where e.series_id = ? and ${which}.id = ?
     )
     select person_id, why from (
       select competitor_id as person_id, 'enters this car' as why, 1 as place from inspected
       union all
       select p.competitor_id, 'declared this engine', 2 from inspected i
       join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
       union all
       select g.owner_id, 'owns this engine', 3 from inspected i
       join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
       join public.engine g on g.id = p.engine_id
       union all
       select v.handed_in_by, 'handed in this engine’s paperwork', 4 from inspected i
       join record.paperwork_version v
         on v.series_id = i.series_id and v.paperwork_id = i.paperwork_id
       union all
       select e.competitor_id, 'runs in this class at this event', 5 from inspected i
       join public.entry e on e.series_id = i.series_id and e.event_id = i.event_id
         and e.class_id = i.class_id and e.state = 'entered'
       union all
       select p.competitor_id, 'has an engine declared in this class', 6 from inspected i
       join public.paperwork p on p.series_id = i.series_id and p.class_id = i.class_id
         and p.state <> 'withdrawn' and p.versions > 0
       union all
       select n.person_id, case n.kind
           when 'team' then 'is of this competitor’s team'
           when 'builder' then 'builds this competitor’s engines'
           when 'relation' then 'is related to this competitor'
           else 'has declared an interest' end
           || case when n.words = '' then '' else ' (' || n.words || ')' end, 0
       from inspected i
       join public.interest n on n.series_id = i.series_id and n.ended_at is null
         and (n.car_number = i.car_number or n.competitor_id = i.competitor_id
              or n.competitor_id = (select p.competitor_id from public.paperwork p
                where p.series_id = i.series_id and p.id = i.paperwork_id))
     ) found where person_id is not null order by place desc`,
    [seriesId, id],
  );
  return new Map(rows.map((row) => [row.person_id, row.why]));
};

/** Of an inspection's car. */
export const interestsIn = (
  em: EntityManager,
  { seriesId, id }: Pick<Inspection, 'seriesId' | 'id'>,
): Promise<ReadonlyMap<string, string>> => interests(em, seriesId, 'i', id);

/** Of an entered car, whether it is inspected or not. */
export const interestsInEntry = (
  em: EntityManager,
  { seriesId, id }: Pick<Entry, 'seriesId' | 'id'>,
): Promise<ReadonlyMap<string, string>> => interests(em, seriesId, 'e', id);
