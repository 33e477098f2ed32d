import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import type { Ports } from '../ports';
import type { CarsToEnter } from './enter-cars';
import { type Planned, planEntries } from './plan-entries';

/** What entering would do, and what stands in its way; nothing is written. */
export const tryCars = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  { seriesId, eventId, entries }: CarsToEnter,
): Promise<
  Result<{ readonly does: readonly Planned['does'][]; readonly faults: readonly Fault[] }, Failure>
> => {
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId)) return fail(absent());
  const event = await deps.db.findOne(Event, { seriesId, id: eventId });
  if (event === null) return fail(absent());
  const { planned, faults } = await planEntries(deps.db, event, entries);
  return ok({ does: planned.map(({ does }) => does), faults });
};
