import { type EntityManager, LockMode } from '@mikro-orm/postgresql';
import { Event } from '@/entities/event/event';

/** The event's row, locked: who changes entries, results, picks or checks of one event waits in turn. */
export const lockEvent = (
  em: EntityManager,
  seriesId: string,
  eventId: string,
): Promise<Event | null> =>
  em.findOne(Event, { seriesId, id: eventId }, { lockMode: LockMode.PESSIMISTIC_WRITE });
