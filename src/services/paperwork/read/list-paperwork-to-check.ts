import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { PaperworkState } from '@/domain/paperwork/state';
import type { Ports } from '../../ports';
import { isoOf } from './read-row';

export interface PaperworkToCheckRow {
  readonly id: string;
  readonly seriesName: string;
  readonly className: string;
  readonly competitorName: string;
  readonly carNumber: string;
  readonly reference: string;
  readonly state: PaperworkState;
  readonly versions: number;
  readonly zone: string;
  readonly handedInAt: string;
  readonly dueAt: string | null;
  readonly dueEvent: string | null;
}

/** What was handed in: first what waits for a decision, by the event it is due for and then by its time. */
export const listPaperworkToCheck = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly PaperworkToCheckRow[]> => {
  const open = seriesWhere(actor, 'paperwork.decide');
  return deps.db.execute<PaperworkToCheckRow[]>(
    `select p.id, s.name as "seriesName", c.name as "className", o.name as "competitorName",
       p.car_number as "carNumber", e.reference, p.state, p.versions, s.zone,
       ${isoOf('v.received_at')} as "handedInAt",
       ${isoOf('x.starts_at')} as "dueAt", x.name as "dueEvent"
     from public.paperwork p
     join public.series s on s.id = p.series_id
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.engine e on e.id = p.engine_id
     join public.person o on o.id = p.competitor_id
     join record.paperwork_version v on v.series_id = p.series_id and v.paperwork_id = p.id
       and v.number = p.versions
     left join lateral (
       select t.starts_at, t.name from public.event t
       where t.series_id = p.series_id and t.season_id = c.season_id and t.starts_at > ?
       order by t.starts_at limit 1
     ) x on true
     where p.series_id = any(?::uuid[])
     order by (p.state = 'handed-in') desc,
       case when p.state = 'handed-in' then x.starts_at end nulls last,
       case when p.state = 'handed-in' then v.received_at end, v.received_at desc`,
    [deps.clock.now(), `{${open.join(',')}}`],
  );
};
