import type { EntityManager } from '@mikro-orm/postgresql';
import { formatInZone } from '@/domain/deadline/format-in-zone';

const BECAUSE: Readonly<Record<string, string>> = {
  position: 'by finishing position',
  protested: 'on a protest',
  nominated: 'nominated',
  drawn: 'drawn',
  'failed-check': 'for a check that failed',
};

/** Who picked a car before, why and when, in words; nothing where nobody did. */
export const pickedAlready = async (
  em: EntityManager,
  seriesId: string,
  entryId: string,
  zone: string,
): Promise<string | undefined> => {
  const [row] = await em.execute<{ because: string; by: string; at: Date }[]>(
    `select i.picked_because as because, p.name as by, i.picked_at as at
     from public.inspection i join public.person p on p.id = i.picked_by
     where i.series_id = ? and i.entry_id = ?`,
    [seriesId, entryId],
  );
  return row === undefined
    ? undefined
    : `${BECAUSE[row.because] ?? row.because}, by ${row.by}, ${formatInZone(new Date(row.at).toISOString(), zone)}`;
};
