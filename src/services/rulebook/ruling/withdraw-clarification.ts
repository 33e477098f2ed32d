import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Withdrawal } from '@/domain/rulebook/ruling';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { readPublications } from '../find-rules';
import { appendPublication } from './append-publication';
import { takeNumber } from './next-number';

/** Ends a clarification from now on, in public and with a reason. What it said stays readable. */
export const withdrawClarification = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly classId: string;
    readonly id: string;
    /** The clarification's number. */
    readonly clarification: number;
    readonly reason: string;
  },
): Promise<Result<{ readonly number: number; readonly hash: string }, Failure>> => {
  if (!may(actor, 'rulebook.publish', input.seriesId)) return fail(absent());
  const { act: actId, ...asked } = input;
  const { seriesId, classId, clarification } = asked;
  const reason = asked.reason.trim();
  return performAct(
    deps,
    actor,
    { id: actId, kind: 'withdraw-clarification', seriesId, input: asked },
    async (act) => {
      const taken = await takeNumber(act.em, seriesId, classId, 'withdrawal');
      if (taken === undefined) return fail(absent());
      const published = await readPublications(act.em, seriesId, classId);
      const found = published.clarifications.find((one) => one.number === clarification);
      if (found === undefined) return fail(absent());
      if (published.withdrawals?.some((one) => one.clarification === clarification)) {
        return fail(failure('not-in-this-state', 'This clarification has been withdrawn already.'));
      }
      if (reason === '' || reason.length > 20_000) {
        return fail(invalid([{ pointer: '/reason', detail: 'Say why: the reason is published.' }]));
      }
      const content: Withdrawal = {
        id: asked.id,
        number: taken.number,
        season: found.season,
        clarification,
        clause: found.clause,
        reason,
        publishedAt: act.at.toISOString(),
      };
      const hash = appendPublication(
        act,
        actor,
        seriesId,
        classId,
        { kind: 'withdrawal', content },
        {
          title: `Clarification ${clarification} of clause ${found.clause} is withdrawn`,
          inForceAt: content.publishedAt,
        },
      );
      return ok({ number: content.number, hash });
    },
  );
};
