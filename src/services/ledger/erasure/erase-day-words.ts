import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, type Result } from '@/domain/result';
import { Event } from '@/entities/event/event';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { eraseWords } from './erase-words';
import { readReason } from './read-reason';

/**
 * Erases the names and reasons given on an event's day: changes of entries, who signed on, custody,
 * seals, witnesses of gauge checks. That each happened, and when, stands; so do reports and verdicts.
 */
export const eraseDayWords = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    /** Published in the ledger: it names no person. */
    readonly reason: string;
  },
): Promise<Result<{ readonly contents: number }, Failure>> => {
  const { act: id, seriesId, eventId } = input;
  if (!may(actor, 'series.administer', seriesId) || !isId(eventId)) return fail(absent());
  const where = { seriesId, id: eventId };
  if ((await deps.db.findOne(Event, where)) === null) return fail(absent());
  const said = readReason(input.reason, 'why they are erased, without naming anybody');
  if (!said.ok) return said;
  const reason = said.value;
  return performAct(
    deps,
    actor,
    { id, kind: 'erase-day-words', seriesId, input: { eventId, reason } },
    async (act) => {
      // Whoever changes entries or records a check of the event waits here.
      await act.em.findOneOrFail(Event, where, { lockMode: LockMode.PESSIMISTIC_WRITE });
      const subject = { kind: 'event', id: eventId } as const;
      const nothing = 'There are no names and reasons to be erased.';
      return eraseWords(act, { seriesId, subject, reason, nothing });
    },
  );
};
