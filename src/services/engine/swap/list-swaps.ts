import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { SwapListed } from '@/domain/paddock/paddock-rows';
import { openTo } from '../../paperwork/own-paperwork';
import { isoOf } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';

const SELECT = `
select w.id, v.name as "eventName", w.car_number as "carNumber", o.name as "competitorName",
  w.from_reference as from, w.to_reference as to, w.seal, w.paperwork_id as "paperworkId",
  case when f.state is distinct from 'kept' then 'not-in-yet'
    when f.sha256 = w.photograph_sha256 then 'kept' else 'another' end as photograph,
  w.photograph_id as "photographId", ${isoOf('f.kept_at')} as "photographAt", p.state as paperwork,
  p.state in ('handed-in', 'accepted') as "handedIn",
  ${isoOf('w.due_at')} as "dueAt", ${isoOf('w.received_at')} as "swappedAt", v.zone
from record.engine_swap w
join public.event v on v.series_id = w.series_id and v.id = w.event_id
join public.paperwork p on p.series_id = w.series_id and p.id = w.paperwork_id
join public.person o on o.id = p.competitor_id
left join public.file f on f.series_id = w.series_id and f.id = w.photograph_id`;

/** Engines swapped at the track, for officials: those whose rest is not accepted yet, and of the last weeks. */
export const listSwapsToCheck = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly SwapListed[]> => {
  const open = seriesWhere(actor, 'paperwork.decide');
  const since = new Date(clock.now().getTime() - 21 * 86_400_000);
  return db.execute<SwapListed[]>(
    `${SELECT} where w.series_id = any(?::uuid[]) and (w.received_at > ? or p.state <> 'accepted')
     order by w.received_at desc`,
    [`{${open.join(',')}}`, since],
  );
};

/** The actor's own swaps, and those of people who open their paperwork to them. */
export const listOwnSwaps = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly SwapListed[]> => {
  const open = openTo(actor, 'see');
  return db.execute<SwapListed[]>(`${SELECT} where ${open.sql} order by w.received_at desc`, [
    ...open.parameters,
  ]);
};
