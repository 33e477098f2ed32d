import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import { Series } from '@/entities/series/series';
import type { Ports } from '../../ports';
import { type ClassResults, readResults } from './read-results';

/** An event's results for whoever runs it. */
export const findEventResults = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  eventId: string,
): Promise<
  Result<
    {
      readonly event: Event;
      readonly series: { readonly name: string; readonly slug: string };
      readonly classes: readonly ClassResults[];
    },
    Failure
  >
> => {
  const series = [...seriesWhere(actor, 'event.manage')];
  if (!isId(eventId) || series.length === 0) return fail(absent());
  const event = await deps.db.findOne(Event, { id: eventId, seriesId: { $in: series } });
  if (event === null) return fail(absent());
  const { seriesId } = event;
  const { name, slug } = await deps.db.findOneOrFail(Series, { id: seriesId });
  const classes = await readResults(deps.db, { seriesId, eventId });
  return ok({ event, series: { name, slug }, classes });
};
