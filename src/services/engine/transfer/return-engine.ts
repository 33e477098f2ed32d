import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { type ActDeps, performAct } from '../../act/perform-act';
import { recordTransfer } from './transfer-line';

/** Gives a lent engine back before the loan's end; on that day it goes back by itself. */
export const returnEngine = async (
  deps: ActDeps,
  actor: Actor,
  { act: id, engineId }: { readonly act: string; readonly engineId: string },
): Promise<Result<null, Failure>> => {
  const held = { id: engineId, holderId: actor.personId };
  if (!isId(engineId) || (await deps.db.count(Engine, held)) === 0) return fail(absent());
  return performAct(
    deps,
    actor,
    { id, kind: 'return-engine', seriesId: null, input: { engineId } },
    async (act) => {
      const { em, at } = act;
      const engine = await em.findOne(Engine, held, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (engine === null) return fail(absent());
      if (!engine.heldUntil || engine.heldUntil <= at) {
        const detail = 'This loan is over: the engine is back with its owner.';
        return fail(failure('not-in-this-state', detail));
      }
      Object.assign(engine, { holderId: null, heldUntil: null });
      await recordTransfer(act, {
        id: deps.random.uuid(),
        engineId,
        kind: 'returned',
        fromId: actor.personId,
        toId: engine.ownerId,
        untilAt: null,
      });
      return ok(null);
    },
  );
};
