import type { DrawnCar } from '@/contracts/draw/draw';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { DrawCommitment } from '@/domain/draw/documents';
import type { DrawState } from '@/domain/draw/history';
import { isId } from '@/domain/is-id';
import { Event } from '@/entities/event/event';
import { RaceClass } from '@/entities/series/race-class';
import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';
import { type DrawRow, listDrawRows, stateOf } from './find-history';
import { findPool, type Pool } from './find-pool';
import { listDrawnCars } from './pick-drawn';

export interface DrawEvent {
  readonly event: Event;
  readonly series: { readonly id: string; readonly slug: string; readonly name: string };
  readonly classes: readonly RaceClass[];
}

/** The event whose cars the actor may pick; nothing for anybody else. */
export const findDrawEvent = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  eventId: string,
): Promise<DrawEvent | undefined> => {
  const open = seriesWhere(actor, 'cars.pick');
  if (open.length === 0 || !isId(eventId)) return undefined;
  const event = await deps.db.findOne(Event, { id: eventId, seriesId: { $in: [...open] } });
  if (event === null) return undefined;
  const { seriesId, seasonId } = event;
  const { id, slug, name } = await deps.db.findOneOrFail(Series, { id: seriesId });
  const order = { orderBy: { name: 'asc' } } as const;
  const classes = await deps.db.find(RaceClass, { seriesId, seasonId }, order);
  return { event, series: { id, slug, name }, classes };
};

export interface ClassDraw extends DrawEvent {
  readonly raceClass: RaceClass;
  readonly state: DrawState;
  /** The draw that `state` tells of. */
  readonly row: DrawRow | undefined;
  /** The cars entered now, of which a draw announced now would draw. */
  readonly now: Pool;
  /** Of a draw that was made. */
  readonly drawn: readonly DrawnCar[];
  /** Values announced last in this series: most nights are alike. */
  readonly lastValues: DrawCommitment['values'];
}

/** What an official needs to know of a class's draw; nothing for anybody else. */
export const findClassDraw = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  asked: { readonly eventId: string; readonly classId: string },
): Promise<ClassDraw | undefined> => {
  const found = await findDrawEvent(deps, actor, asked.eventId);
  const raceClass = found?.classes.find(({ id }) => id === asked.classId);
  if (found === undefined || raceClass === undefined) return undefined;
  const subject = { seriesId: found.series.id, eventId: found.event.id, classId: raceClass.id };
  const rows = await listDrawRows(deps.db, subject);
  const row = rows.at(-1);
  const drawn = row?.end === 'made' ? await listDrawnCars(deps.db, subject.seriesId, row) : [];
  const [last] = await deps.db.execute<{ document: string }[]>(
    'select document from record.draw where series_id = ? order by announced_at desc limit 1',
    [subject.seriesId],
  );
  return {
    ...found,
    raceClass,
    state: stateOf(rows),
    row,
    now: await findPool(deps.db, subject),
    drawn: drawn.map(({ car, state, inspectionId }) => ({ car, state, inspectionId })),
    lastValues: last ? (JSON.parse(last.document) as DrawCommitment).values : [],
  };
};

export interface ClassDrawListed {
  readonly id: string;
  readonly name: string;
  readonly state: DrawState;
  readonly cars: number;
}

/** The classes of an event, each with where its draw stands. */
export const listClassDraws = async (
  deps: Pick<Ports, 'db'>,
  { series, event, classes }: DrawEvent,
): Promise<readonly ClassDrawListed[]> => {
  const rows = await listDrawRows(deps.db, { seriesId: series.id, eventId: event.id });
  const listed: ClassDrawListed[] = [];
  for (const { id, name } of classes) {
    const subject = { seriesId: series.id, eventId: event.id, classId: id };
    const { pool } = await findPool(deps.db, subject);
    const state = stateOf(rows.filter(({ classId }) => classId === id));
    if (pool.length > 0 || state.at !== 'none') listed.push({ id, name, state, cars: pool.length });
  }
  return listed;
};
