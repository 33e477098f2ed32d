import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import { FRESH_MINUTES, isFresh } from '../../inspection/report/sign-report';
import type { Ports } from '../../ports';
import { lockEvent } from '../lock-event';
import { readChecks, rulesByClass } from './read-checks';
import { sheetOf } from './sheet-of';

/**
 * Signs an event's checks without teardown: one page, one signature, by a fresh sign-in. Every entered
 * car has passed every check of its class that was made that night, or has an inspection of its own.
 * Everybody sees cars and clauses; values and names stay with the parties.
 */
export const signChecks = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    /** How many checks there were when the signer read the page. */
    readonly mark: string;
  },
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  const { act, seriesId, eventId, mark } = input;
  if (!may(actor, 'inspection.record', seriesId) || !isId(eventId)) return fail(absent());
  if (!isFresh(actor, deps.clock.now()))
    return fail(
      failure(
        'fresh-sign-in-required',
        `A signature needs a sign-in of the last ${FRESH_MINUTES} minutes. Sign in once more, then sign.`,
      ),
    );
  return performAct(
    deps,
    actor,
    { id: act, kind: 'sign-checks', seriesId, input: { eventId, mark } },
    async ({ em, at, append, keepRules, line }) => {
      const event = await lockEvent(em, seriesId, eventId);
      if (event === null) return fail(absent());
      const shown = await readChecks(em, event);
      if (shown.mark !== mark) return fail(stale());
      const { cars, missing } = sheetOf(shown);
      if (cars.length === 0)
        return fail(failure('not-in-this-state', 'No car has been checked at this event yet.'));
      const faults = missing.map(
        ({ carNumber, clause }): Fault => ({
          pointer: '',
          detail: `Car ${carNumber}: clause ${clause} is not checked, or not passed, and it has no inspection.`,
        }),
      );
      if (faults.length > 0) return fail(invalid(faults));
      const rules: Record<string, string> = {};
      const inForce = await rulesByClass(
        em,
        event,
        cars.map(({ classId }) => classId),
      );
      for (const [classId, { document }] of inForce) {
        const name = cars.find((car) => car.classId === classId)?.className ?? classId;
        rules[name] = toHex(await keepRules(seriesId, document));
      }
      const [last] = await em.execute<{ n: number }[]>(
        'select count(*)::int as n from record.event_clearance where series_id = ? and event_id = ?',
        [seriesId, eventId],
      );
      const number = (last?.n ?? 0) + 1;
      const base = {
        v: '1',
        series: seriesId,
        event: eventId,
        number: String(number),
        signedAt: at.toISOString(),
        rules,
      };
      const document = canonicalJson({
        ...base,
        type: 'tagwire/event-checks',
        signer: { id: actor.personId, name: actor.name },
        cars: cars.map(({ carNumber: car, className, outcome, checks }) => ({
          car,
          className,
          outcome,
          checks: checks.map(({ value, gauge, ...check }) => ({
            ...check,
            ...(value === null ? {} : { value }),
            ...(gauge === null ? {} : { gauge }),
          })),
        })),
      });
      const hash = sha256(utf8(document));
      append('event_clearance', [
        {
          series_id: seriesId,
          event_id: eventId,
          number,
          document,
          hash,
          signed_by: actor.personId,
          signature: {
            kind: 'fresh-authentication',
            authenticatedAt: actor.authenticatedAt,
            session: actor.sessionId,
          },
          signed_at: at.toISOString(),
        },
      ]);
      line({
        seriesId,
        kind: 'event-cleared',
        contents: {
          cleared: {
            text: canonicalJson({
              ...base,
              type: 'tagwire/event-cleared',
              sheet: toHex(hash),
              cars: cars.map(({ carNumber: car, className, outcome, checks }) => ({
                car,
                className,
                outcome,
                clauses: outcome === 'passed' ? checks.map(({ clause }) => clause) : [],
              })),
            }),
            open: true,
          },
          sheet: { text: document, open: false },
        },
        refs: { event: eventId },
      });
      return ok({ number, hash: toHex(hash) });
    },
  );
};
