import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../../ports';

export interface BarnEvent {
  readonly id: string;
  readonly name: string;
  readonly cars: number;
}

const NEAR_DAYS = 10;

/** Events that are near, before or after, in every series where the actor reads inspections. */
export const listBarnEvents = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly BarnEvent[]> => {
  const series = [...seriesWhere(actor, 'inspection.read')];
  if (series.length === 0) return [];
  const now = deps.clock.now();
  return deps.db.execute<BarnEvent[]>(
    `select v.id, v.name,
            (select count(*)::int from public.entry e where e.series_id = v.series_id
               and e.event_id = v.id and e.state = 'entered') as cars
     from public.event v
     where v.series_id in (${series.map(() => '?').join(', ')})
       and v.starts_at < ?::timestamptz + make_interval(days => ${NEAR_DAYS})
       and v.ends_at > ?::timestamptz - make_interval(days => ${NEAR_DAYS})
     order by abs(extract(epoch from v.starts_at - ?::timestamptz)) limit 5`,
    [...series, now, now, now],
  );
};
