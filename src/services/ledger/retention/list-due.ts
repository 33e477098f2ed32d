import type { EntityManager } from '@mikro-orm/postgresql';
import { erasableWith } from '../erasure/erase-lines';

export interface Due {
  readonly kind: 'paperwork' | 'inspection' | 'event';
  readonly id: string;
  /** Empty of an event. */
  readonly carNumber: string;
  /** The class, or the event. */
  readonly name: string;
  readonly season: string;
  /** The season's last day, `2026-12-31`. */
  readonly endedOn: string;
  /** Why it is kept all the same; nothing when no hold stands. */
  readonly held: string | null;
}

/** Season `n`, and whether it is over by the clocks of the series. */
const OVER = `n.ends_on < (?::timestamptz at time zone s.zone)::date`;

const heldFor = (subjects: string): string =>
  `(select h.reason from public.hold h where h.series_id = s.id and h.lifted_at is null
     and h.subject_id in (s.id, ${subjects}) order by h.since limit 1)`;

/**
 * What the series has set to be erased at the season's end and is still here: paperwork on which no
 * inspection rests, pen strokes beside signatures, names and reasons of events. Nothing where the series keeps all for good.
 */
export const listDue = async (
  em: EntityManager,
  seriesId: string,
  now: Date,
): Promise<readonly Due[]> => {
  const paperwork = await em.execute<Due[]>(
    `select 'paperwork' as kind, p.id, p.car_number as "carNumber", c.name,
            n.name as season, n.ends_on::text as "endedOn", ${heldFor('p.id')} as held
     from public.retention r
     join public.series s on s.id = r.series_id
     join public.paperwork p on p.series_id = s.id
     join public.class c on c.series_id = s.id and c.id = p.class_id
     join public.season n on n.series_id = s.id and n.id = c.season_id
     where r.series_id = ? and r.uninspected_paperwork = 'season-end' and ${OVER}
       and (exists (select from record.paperwork_version v where v.series_id = s.id
           and v.paperwork_id = p.id and v.document is not null)
         or exists (select from record.engine_swap w where w.series_id = s.id
           and w.paperwork_id = p.id and w.to_reference <> 'erased'))
       and not exists (select from public.inspection i where i.series_id = s.id
         and i.paperwork_id = p.id)
     order by n.ends_on, p.car_number, p.id`,
    [seriesId, now],
  );
  const strokes = await em.execute<Due[]>(
    `select 'inspection' as kind, i.id, e.car_number as "carNumber", c.name,
            n.name as season, n.ends_on::text as "endedOn", ${heldFor('i.id, i.paperwork_id')} as held
     from public.retention r
     join public.series s on s.id = r.series_id
     join public.inspection i on i.series_id = s.id
     join public.entry e on e.series_id = s.id and e.id = i.entry_id
     join public.class c on c.series_id = s.id and c.id = e.class_id
     join public.season n on n.series_id = s.id and n.id = c.season_id
     where r.series_id = ? and r.pen_strokes = 'season-end' and ${OVER}
       and exists (select from record.signature_strokes k where k.series_id = s.id
         and k.inspection_id = i.id and k.strokes is not null)
     order by n.ends_on, e.car_number, i.id`,
    [seriesId, now],
  );
  const words = await em.execute<Due[]>(
    `select 'event' as kind, v.id, '' as "carNumber", v.name, n.name as season,
            n.ends_on::text as "endedOn",
            (select h.reason from public.hold h where h.series_id = s.id and h.lifted_at is null
               and (h.subject_id = s.id or exists (select from public.inspection i
                 where i.series_id = s.id and i.event_id = v.id
                   and h.subject_id in (i.id, i.paperwork_id)))
             order by h.since limit 1) as held
     from public.retention r
     join public.series s on s.id = r.series_id
     join public.event v on v.series_id = s.id
     join public.season n on n.series_id = s.id and n.id = v.season_id
     where r.series_id = ? and r.day_words = 'season-end' and ${OVER}
       and v.id in (select append.event_of_line(l) from record.ledger_line l
         join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
         where l.series_id = r.series_id and c.content is not null and ${erasableWith('event')})
     order by n.ends_on, v.starts_at, v.id`,
    [seriesId, now],
  );
  return [...paperwork, ...strokes, ...words];
};
