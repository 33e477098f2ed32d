import type { EventRequest } from '@/contracts/event/event';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import { Season } from '@/entities/series/season';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Opens an event in a season. Its start is the instant for which the rules in force are asked. */
export const createEvent = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: EventRequest & { readonly seriesId: string },
): Promise<Result<{ readonly id: string }, Failure>> => {
  const { act, seriesId, ...event } = input;
  if (!may(actor, 'event.manage', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'create-event', seriesId, input: event },
    async ({ em }) => {
      const { seasonId, slug } = event;
      if ((await em.count(Season, { seriesId, id: seasonId })) === 0)
        return fail(invalid([{ pointer: '/seasonId', detail: 'Choose a season.' }]));
      if ((await em.count(Event, { seriesId, slug })) > 0)
        return fail(invalid([{ pointer: '/slug', detail: 'Another event has this short name.' }]));
      const [last] = await em.find(
        Event,
        { seriesId, seasonId },
        { orderBy: { number: 'desc' }, limit: 1 },
      );
      em.persist(
        em.create(Event, {
          seriesId,
          id: event.id,
          seasonId,
          number: (last?.number ?? 0) + 1,
          slug,
          name: event.name,
          track: event.track,
          zone: event.zone,
          startsAt: new Date(event.startsAt),
          endsAt: new Date(event.endsAt),
          protestMinutes: event.protestMinutes,
          resultsState: 'none',
          version: 1,
        }),
      );
      return ok({ id: event.id });
    },
  );
};
