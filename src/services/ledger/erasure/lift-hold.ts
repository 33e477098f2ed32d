import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockHolds } from './obstacle';

/** Ends a hold; lifting a lifted one is absent. */
export const liftHold = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: { readonly act: string; readonly seriesId: string; readonly holdId: string },
): Promise<Result<null, Failure>> => {
  const { act, seriesId, holdId } = input;
  if (!may(actor, 'series.administer', seriesId) || !isId(holdId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'lift-hold', seriesId, input: { holdId } },
    async ({ em, at }) => {
      await lockHolds(em, seriesId);
      const rows = await em.execute<{ id: string }[]>(
        `update public.hold set lifted_at = ?, lifted_by = ?
         where series_id = ? and id = ? and lifted_at is null returning id`,
        [at, actor.personId, seriesId, holdId],
      );
      return rows.length === 0 ? fail(absent()) : ok(null);
    },
  );
};
