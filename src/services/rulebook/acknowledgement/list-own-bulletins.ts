import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../../ports';

export interface OwnBulletin {
  readonly id: string;
  readonly seriesId: string;
  readonly number: number;
  readonly title: string;
  readonly className: string;
  readonly seriesName: string;
  readonly zone: string;
  /** Address of its public page. */
  readonly path: string;
  /** Hexadecimal, of its document. */
  readonly hash: string;
  /** Nothing while it waits for an event that is not announced. */
  readonly inForceAt: string | null;
  /** Nothing while the actor has not said to have read it. */
  readonly acknowledgedAt: string | null;
  /** Own engines that it makes illegal, as declared. */
  readonly engines: readonly string[];
}

type Row = Omit<OwnBulletin, 'inForceAt' | 'acknowledgedAt'> & {
  readonly inForceAt: Date | null;
  readonly acknowledgedAt: Date | null;
};

const iso = (at: Date | null): string | null => (at === null ? null : new Date(at).toISOString());

/**
 * Bulletins to the standing editions of the classes in which the actor has paperwork, an engine or an
 * entry, the newest first.
 */
export const listOwnBulletins = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly OwnBulletin[]> => {
  const series = seriesWhere(actor, 'paperwork.hand-in');
  if (series.length === 0) return [];
  const { personId } = actor;
  const rows = await deps.db.execute<Row[]>(
    `with own as (
       select w.series_id, w.class_id, w.id from public.paperwork w
       join public.engine g on g.id = w.engine_id
       where w.series_id = any(?::uuid[]) and w.state <> 'withdrawn'
         and ? in (w.competitor_id, g.owner_id)
     ), raced as (
       select series_id, class_id from own
       union select n.series_id, n.class_id from public.entry n
       where n.series_id = any(?::uuid[]) and n.competitor_id = ? and n.state = 'entered'
     )
     select b.id, b.series_id as "seriesId", b.number, b.title, c.name as "className",
       s.name as "seriesName", s.zone, encode(b.hash, 'hex') as hash, 
       coalesce(b.in_force_at, (select min(e.starts_at) from public.event e
        where e.series_id = c.series_id and e.season_id = c.season_id
          and e.starts_at >= b.published_at)) as "inForceAt",
       format('/series/%s/rulebooks/%s/bulletins/%s', s.slug, c.slug, b.number) as path,
       (select min(a.acknowledged_at) from record.bulletin_acknowledgement a
        where a.series_id = b.series_id and a.bulletin_id = b.id and a.person_id = ?) as "acknowledgedAt",
       coalesce((select jsonb_agg(g.name order by g.car_number)
        from record.bulletin_engine g join own on own.series_id = g.series_id and own.id = g.paperwork_id
        where g.series_id = b.series_id and g.bulletin_id = b.id), '[]') as engines
     from raced
     join public.class c on c.series_id = raced.series_id and c.id = raced.class_id
     join public.season y on y.series_id = c.series_id and y.id = c.season_id
     join public.series s on s.id = c.series_id
     join record.rule_publication b
       on b.series_id = c.series_id and b.class_id = c.id and b.kind = 'bulletin'
     where (b.document::jsonb #>> '{content,edition}')::int = (
         select e.number from record.rule_publication e
         where e.series_id = c.series_id and e.class_id = c.id and e.kind = 'edition'
           and e.in_force_at <= ?
         order by e.in_force_at desc, e.number desc limit 1)
       and y.ends_on >= (?::timestamptz at time zone s.zone)::date
     order by b.published_at desc, b.number desc`,
    [
      `{${series.join(',')}}`,
      personId,
      `{${series.join(',')}}`,
      personId,
      personId,
      deps.clock.now(),
      deps.clock.now(),
    ],
  );
  return rows.map((row) => ({
    ...row,
    inForceAt: iso(row.inForceAt),
    acknowledgedAt: iso(row.acknowledgedAt),
  }));
};
