import type { Pick as CarPick } from '@/contracts/event/event';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { lockEvent } from './lock-event';
import { openInspections } from './open-inspections';

/**
 * Picks cars for inspection: by finishing position, protested, nominated with a reason, or drawn. Two
 * officials at once stand in one queue: the second is told what the first picked.
 */
export const pickCars = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    readonly picks: readonly CarPick[];
  },
): Promise<Result<{ readonly inspections: readonly string[] }, Failure>> => {
  const { act, seriesId, eventId, picks } = input;
  if (!may(actor, 'cars.pick', seriesId) || !isId(eventId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'pick-cars', seriesId, input: { eventId, picks } },
    async (within) => {
      const event = await lockEvent(within.em, seriesId, eventId);
      if (event === null) return fail(absent());
      const opened = await openInspections(within, event, actor.personId, picks);
      return opened.ok ? ok({ inspections: opened.value }) : opened;
    },
  );
};
