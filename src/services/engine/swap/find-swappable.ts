import { openings } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { isoOf } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';

/** A car that runs at an event, and what engine is in it by the entry. */
export interface SwappableEntry {
  readonly entryId: string;
  readonly seriesId: string;
  readonly seriesName: string;
  readonly classId: string;
  readonly className: string;
  readonly eventId: string;
  readonly eventName: string;
  readonly zone: string;
  readonly competitorId: string;
  readonly competitorName: string;
  readonly carNumber: string;
  readonly engineReference: string;
  readonly startsAt: string;
}

export const EARLY_DAYS = 7;
export const LATE_HOURS = 12;

/** Cars whose engine the actor may swap now: entered at an event of these days, not withdrawn. */
export const findSwappable = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  entryId: string | null = null,
): Promise<readonly SwappableEntry[]> => {
  const now = clock.now();
  // A right to some engines is none to put another one in.
  const open = openings(actor, 'answers').filter(
    ({ engineIds, seriesIds }) => engineIds === undefined && seriesIds.length > 0,
  );
  if (open.length === 0) return [];
  const whose = open.map(() => '(e.competitor_id = ? and e.series_id = any(?::uuid[]))');
  return db.execute<SwappableEntry[]>(
    `select e.id as "entryId", e.series_id as "seriesId", s.name as "seriesName",
       e.class_id as "classId", c.name as "className", v.id as "eventId", v.name as "eventName",
       v.zone, e.competitor_id as "competitorId", e.competitor_name as "competitorName",
       e.car_number as "carNumber",
       e.engine_reference as "engineReference", ${isoOf('v.starts_at')} as "startsAt"
     from public.entry e
     join public.event v on v.series_id = e.series_id and v.id = e.event_id
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     join public.series s on s.id = e.series_id
     where (${whose.join(' or ')}) and e.state = 'entered' and (?::uuid is null or e.id = ?)
       and v.starts_at < ? and v.ends_at > ?
     order by v.starts_at, e.car_number`,
    [
      ...open.flatMap(({ competitorId, seriesIds }) => [competitorId, `{${seriesIds.join(',')}}`]),
      entryId,
      entryId,
      new Date(now.getTime() + EARLY_DAYS * 86_400_000),
      new Date(now.getTime() - LATE_HOURS * 3_600_000),
    ],
  );
};
