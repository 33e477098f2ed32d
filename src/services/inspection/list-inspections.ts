import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { InspectionState } from '@/domain/inspection/state';
import type { Ports } from '../ports';

export interface InspectionListed {
  readonly id: string;
  readonly seriesId: string;
  readonly event: string;
  readonly eventId: string;
  readonly className: string;
  readonly carNumber: string;
  readonly competitor: string;
  readonly because: string;
  readonly words: string;
  readonly state: InspectionState;
  readonly stateReason: string;
  readonly correcting: boolean;
  readonly bay: string;
  /** Where it is taken apart when that is not the event's own barn. */
  readonly place: string;
  readonly inspectorId: string | null;
  readonly inspector: string | null;
  readonly readings: number;
  readonly revisions: number;
}

/** Next up: what is open first, then to do, by bay; what is signed last. Of every series one may read in. */
export const listInspections = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  filter: { readonly eventId?: string } = {},
): Promise<readonly InspectionListed[]> => {
  const series = seriesWhere(actor, 'inspection.read');
  if (series.length === 0) return [];
  return deps.db.execute<InspectionListed[]>(
    `select i.id, i.series_id as "seriesId", v.name as event, v.id as "eventId", c.name as "className",
            e.car_number as "carNumber", e.competitor_name as competitor,
            i.picked_because as because, i.picked_words as words, i.state,
            i.state_reason as "stateReason", i.correction_reason <> '' as correcting, i.bay, i.place,
            i.inspector_id as "inspectorId", p.name as inspector,
            (select count(*)::int from record.reading r
             where r.series_id = i.series_id and r.inspection_id = i.id) as readings,
            (select count(*)::int from record.report r
             where r.series_id = i.series_id and r.inspection_id = i.id) as revisions
     from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     left join public.person p on p.id = i.inspector_id
     where i.series_id in (${series.map(() => '?').join(', ')})
     ${filter.eventId === undefined ? '' : 'and i.event_id = ?'}
     order by array_position(array['open','held-hot','to-do','stopped','deferred','refused','closed'], i.state),
              i.bay = '', i.bay, v.starts_at desc, e.car_number`,
    [...series, ...(filter.eventId === undefined ? [] : [filter.eventId])],
  );
};
