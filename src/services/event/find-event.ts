import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { fastestLap } from '@/domain/event/lap-time';
import { absent, type Failure } from '@/domain/failure';
import type { InspectionState } from '@/domain/inspection/state';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import { RaceClass } from '@/entities/series/race-class';
import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';

export interface EventNamed {
  readonly id: string;
  readonly seriesId: string;
  readonly series: string;
  readonly name: string;
  readonly track: string;
  readonly startsAt: string;
  readonly zone: string;
  readonly results: Event['resultsState'];
  readonly entries: number;
  readonly inspections: number;
}

/** The events of every series that the actor runs, the newest first. */
export const listEvents = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly EventNamed[]> => {
  const series = seriesWhere(actor, 'event.manage');
  if (series.length === 0) return [];
  return deps.db.execute<EventNamed[]>(
    `select e.id, e.series_id as "seriesId", s.name as series, e.name, e.track, e.zone,
            to_char(e.starts_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as "startsAt",
            e.results_state as results,
            (select count(*)::int from public.entry n where n.series_id = e.series_id and n.event_id = e.id) as entries,
            (select count(*)::int from public.inspection i where i.series_id = e.series_id and i.event_id = e.id) as inspections
     from public.event e join public.series s on s.id = e.series_id
     where e.series_id in (${series.map(() => '?').join(', ')}) order by e.starts_at desc`,
    [...series],
  );
};

export interface EntryListed {
  readonly id: string;
  readonly classId: string;
  readonly className: string;
  readonly carNumber: string;
  readonly competitor: string;
  readonly linked: boolean;
  readonly driver: string;
  readonly engine: string;
  /** As it was written; of many the fastest. */
  readonly fastestLap: string | undefined;
  readonly position: number | null;
  readonly state: 'entered' | 'withdrawn';
  readonly paperwork: string | null;
  readonly inspectionId: string | null;
  readonly inspectionState: InspectionState | null;
  readonly pickedBecause: string | null;
}

export interface EventSheet {
  readonly event: Event;
  readonly series: { readonly id: string; readonly name: string; readonly slug: string };
  readonly classes: readonly {
    readonly id: string;
    readonly name: string;
    readonly slug: string;
  }[];
  readonly entries: readonly EntryListed[];
}

/** One event with its entries by class and position. */
export const findEvent = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  eventId: string,
): Promise<Result<EventSheet, Failure>> => {
  if (!isId(eventId)) return fail(absent());
  const series = seriesWhere(actor, 'event.manage');
  const event = await deps.db.findOne(Event, { id: eventId, seriesId: { $in: [...series] } });
  if (event === null || !may(actor, 'event.manage', event.seriesId)) return fail(absent());
  const { seriesId, seasonId } = event;
  const named = await deps.db.findOneOrFail(Series, { id: seriesId });
  const classes = await deps.db.find(
    RaceClass,
    { seriesId, seasonId },
    { orderBy: { name: 'asc' } },
  );
  const rows = await deps.db.execute<
    (Omit<EntryListed, 'fastestLap'> & { readonly laps: readonly string[] })[]
  >(
    `select e.id, e.class_id as "classId", c.name as "className", e.car_number as "carNumber",
            e.competitor_name as competitor, e.competitor_id is not null as linked,
            e.driver, e.laps, e.engine_reference as engine, e.position, e.state, p.state as paperwork,
            i.id as "inspectionId", i.state as "inspectionState", i.picked_because as "pickedBecause"
     from public.entry e
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     left join public.paperwork p on p.series_id = e.series_id and p.id = e.paperwork_id
     left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     where e.series_id = ? and e.event_id = ?
     order by c.name, e.position nulls last, e.car_number`,
    [seriesId, eventId],
  );
  return ok({
    event,
    series: { id: named.id, name: named.name, slug: named.slug },
    classes: classes.map(({ id, name, slug }) => ({ id, name, slug })),
    entries: rows.map(({ laps, ...row }) => ({ ...row, fastestLap: fastestLap(laps) })),
  });
};
