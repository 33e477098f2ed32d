import type { ChecksShown } from '@/contracts/event/check';
import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import type { Ports } from '../../ports';
import { readChecks } from './read-checks';

/** An event's checks without teardown, for whoever may read inspections of its series. */
export const findChecks = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  eventId: string,
): Promise<Result<{ readonly event: Event; readonly shown: ChecksShown }, Failure>> => {
  const series = [...seriesWhere(actor, 'inspection.read')];
  if (!isId(eventId) || series.length === 0) return fail(absent());
  const event = await deps.db.findOne(Event, { id: eventId, seriesId: { $in: series } });
  if (event === null) return fail(absent());
  const shown = await readChecks(deps.db, event);
  const records = may(actor, 'inspection.record', event.seriesId);
  return ok({ event, shown: { ...shown, records } });
};
