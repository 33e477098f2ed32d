import type { EntityManager } from '@mikro-orm/postgresql';

export interface EntryAcknowledgement {
  readonly entryId: string;
  readonly bulletinId: string;
  /** Who says to have read it. */
  readonly name: string;
  readonly way: 'own' | 'in-person';
  readonly at: string;
}

/**
 * For each entry of an event, the first acknowledgement of each bulletin that holds for it: by its
 * competitor or its engine's owner, or given in person for it or, where no account is linked, for the
 * same competitor's same car at another event of the class.
 */
export const readEntryAcknowledgements = async (
  em: EntityManager,
  seriesId: string,
  eventId: string,
): Promise<readonly EntryAcknowledgement[]> => {
  const rows = await em.execute<(Omit<EntryAcknowledgement, 'at'> & { readonly at: Date })[]>(
    `select distinct on (n.id, a.bulletin_id) n.id as "entryId", a.bulletin_id as "bulletinId",
       a.name, a.way, a.acknowledged_at as at
     from public.entry n
     join record.rule_publication b
       on b.series_id = n.series_id and b.class_id = n.class_id and b.kind = 'bulletin'
     join record.bulletin_acknowledgement a
       on a.series_id = b.series_id and a.bulletin_id = b.id
     left join public.paperwork w on w.series_id = n.series_id and w.id = n.paperwork_id
     left join public.engine g on g.id = w.engine_id
     left join public.entry m on m.series_id = a.series_id and m.id = a.entry_id
     where n.series_id = ? and n.event_id = ?
       and (a.person_id in (n.competitor_id, w.competitor_id, g.owner_id)
         or (a.person_id is null and m.class_id = n.class_id and m.car_number = n.car_number
           and m.competitor_name = n.competitor_name))
     order by n.id, a.bulletin_id, a.acknowledged_at, a.id`,
    [seriesId, eventId],
  );
  return rows.map((row) => ({ ...row, at: new Date(row.at).toISOString() }));
};
