import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { Interest } from '@/entities/event/interest';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Ends an interest from now on. Only the chief or an official does: nobody clears themselves. */
export const endInterest = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: { readonly act: string; readonly seriesId: string; readonly id: string },
): Promise<Result<{ readonly id: string }, Failure>> => {
  const { act, seriesId, id } = input;
  if (!isId(id) || !may(actor, 'inspection.assign', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'end-interest', seriesId, input: { id } },
    async ({ em, at, line }) => {
      const found = await em.findOne(
        Interest,
        { seriesId, id },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (found === null) return fail(absent());
      if (found.endedAt) return fail(failure('not-in-this-state', 'It has ended already.'));
      if (found.personId === actor.personId)
        return fail(
          failure(
            'conflict-of-interest',
            'Nobody ends an interest of their own. Ask another official.',
          ),
        );
      found.endedAt = at;
      await em.flush();
      line({
        seriesId,
        kind: 'interest-declared',
        contents: {
          interest: {
            text: canonicalJson({
              v: '1',
              type: 'tagwire/interest-ended',
              id,
              person: found.personId,
              by: actor.personId,
            }),
            open: false,
          },
        },
      });
      return ok({ id });
    },
  );
};
