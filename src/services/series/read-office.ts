import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../ports';

export interface OfficeWork {
  readonly seriesId: string;
  readonly paperworkToCheck: number;
  readonly reportsToDecide: number;
  readonly inspectionsOpen: number;
  /** Messages that were refused, given up or came back, and nobody was served otherwise. */
  readonly mailsNotReached: number;
  /** The next event that has not ended yet. */
  readonly nextEvent: {
    readonly slug: string;
    readonly name: string;
    readonly startsAt: string;
  } | null;
}

/** What waits for an official, by series. One read. */
export const readOffice = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<ReadonlyMap<string, OfficeWork>> => {
  const ids = seriesWhere(actor, 'series.administer');
  if (ids.length === 0) return new Map();
  const marks = ids.map(() => '?').join(', ');
  const rows = await deps.db.execute<OfficeWork[]>(
    `select s.id as "seriesId",
       (select count(*)::int from public.paperwork p
         where p.series_id = s.id and p.state = 'handed-in') as "paperworkToCheck",
       (select count(*)::int from public.inspection i
         where i.series_id = s.id and i.state = 'closed' and not exists (
           select 1 from record.verdict v where v.series_id = i.series_id and v.inspection_id = i.id
         )) as "reportsToDecide",
       (select count(*)::int from public.inspection i
         where i.series_id = s.id and i.state not in ('closed', 'refused')) as "inspectionsOpen",
       (select count(*)::int from public.mail m
         where m.series_id = s.id and m.state in ('refused', 'given-up', 'bounced') and not exists (
           select 1 from record.served_otherwise o where o.series_id = m.series_id and o.mail_id = m.id
         )) as "mailsNotReached",
       (select jsonb_build_object('slug', e.slug, 'name', e.name, 'startsAt', e.starts_at)
         from public.event e where e.series_id = s.id and e.ends_at > ?
         order by e.starts_at limit 1) as "nextEvent"
     from public.series s where s.id in (${marks})`,
    [deps.clock.now(), ...ids],
  );
  return new Map(rows.map((row) => [row.seriesId, row]));
};
