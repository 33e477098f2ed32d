import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { type ActDeps, performAct } from '../act/perform-act';
import { type EngineFields, engineFaults } from './engine-fields';

/** An engine of the actor's own, with its position map. Engines belong to people, not to a series. */
export const createEngine = async (
  deps: ActDeps,
  actor: Actor,
  input: EngineFields & { readonly act: string; readonly id: string },
): Promise<Result<{ readonly engineId: string }, Failure>> => {
  if (seriesWhere(actor, 'paperwork.hand-in').length === 0) return fail(absent());
  const { act, id, layout, blockCasting, headCastings, serial } = input;
  const faults = engineFaults(input);
  if (faults.length > 0) return fail(invalid(faults));
  const reference = input.reference.trim();
  const request = { id, reference, layout, blockCasting, headCastings, serial };
  return performAct(
    deps,
    actor,
    { id: act, kind: 'create-engine', seriesId: null, input: request },
    async ({ em, at }) => {
      const known = await em.count(Engine, { ownerId: actor.personId, reference });
      if (known > 0) {
        const detail = `You have an engine named ${reference} already. Choose it, or give this one another name.`;
        return fail(invalid([{ pointer: '/reference', detail }]));
      }
      em.persist(
        em.create(Engine, {
          id,
          ownerId: actor.personId,
          reference,
          layout: layout as unknown as Record<string, unknown>,
          blockCasting: blockCasting.trim(),
          headCastings: headCastings.trim(),
          serial: serial.trim(),
          createdAt: at,
        }),
      );
      return ok({ engineId: id });
    },
  );
};
