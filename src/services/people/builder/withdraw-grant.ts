import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { BuilderGrant } from '@/entities/paperwork/builder-grant';
import { type ActDeps, performAct } from '../../act/perform-act';

/** Ends what a builder may do, at once; what they wrote stays. */
export const withdrawGrant = async (
  deps: ActDeps,
  actor: Actor,
  { act: id, grantId }: { readonly act: string; readonly grantId: string },
): Promise<Result<null, Failure>> => {
  const own = { id: grantId, competitorId: actor.personId, withdrawnAt: null };
  if (!isId(grantId) || (await deps.db.count(BuilderGrant, own)) === 0) return fail(absent());
  return performAct(
    deps,
    actor,
    { id, kind: 'withdraw-grant', seriesId: null, input: { grantId } },
    async ({ em, at }) => {
      const grant = await em.findOne(BuilderGrant, own, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (grant === null) return fail(absent());
      grant.withdrawnAt = at;
      return ok(null);
    },
  );
};
