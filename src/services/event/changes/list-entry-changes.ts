import type { EntityManager } from '@mikro-orm/postgresql';
import type { EntryChanged } from './keep-changes';

export interface EntryChangeListed extends EntryChanged {
  readonly by: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
}

/** What was changed about one entry on the day, the first change first. */
export const listEntryChanges = (
  em: EntityManager,
  seriesId: string,
  { entryId }: { readonly entryId: string },
): Promise<readonly EntryChangeListed[]> =>
  em.execute<EntryChangeListed[]>(
    `select c.id, c.entry_id as "entryId", c.kind, c.was, c.becomes, c.reason, p.name as by,
            to_char(c.received_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as at
     from record.entry_change c join public.person p on p.id = c.changed_by
     where c.series_id = ? and c.entry_id = ? order by c.received_at, c.id`,
    [seriesId, entryId],
  );
