import type { EntityManager } from '@mikro-orm/postgresql';
import type { SwapRequest } from '@/contracts/engine/swap';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { Engine } from '@/entities/paperwork/engine';
import { holderOf } from '../engine-holder';

/**
 * The engine that goes in: one that the competitor declares at this time, or a new one of theirs with the
 * position map of the engine that came out, until somebody says otherwise.
 */
export const takeEngine = async (
  em: EntityManager,
  {
    asked,
    competitorId,
    from,
    at,
  }: {
    readonly asked: SwapRequest['engine'];
    readonly competitorId: string;
    readonly from: Engine | null;
    readonly at: Date;
  },
): Promise<Result<Engine, Failure>> => {
  if (!('reference' in asked)) {
    const engine = await em.findOne(Engine, { id: asked.id });
    return engine !== null && holderOf(engine, at) === competitorId ? ok(engine) : fail(absent());
  }
  const reference = asked.reference.trim();
  const known = await em.count(Engine, { ownerId: competitorId, reference });
  if (reference === '' || known > 0) {
    const detail =
      known > 0
        ? `There is an engine named ${reference} already. Choose it, or name this one otherwise.`
        : 'Name the engine.';
    return fail(invalid([{ pointer: '/engine/reference', detail }]));
  }
  const engine = em.create(Engine, {
    id: asked.id,
    ownerId: competitorId,
    reference,
    layout: from?.layout ?? (GENERIC_LAYOUTS[0] as unknown as Record<string, unknown>),
    blockCasting: asked.blockCasting.trim(),
    headCastings: '',
    serial: '',
    createdAt: at,
  });
  em.persist(engine);
  await em.flush();
  return ok(engine);
};
