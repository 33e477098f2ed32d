import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import { type EngineFacts, sameFacts } from '@/domain/paddock/engine-facts';
import { fail, ok, type Result } from '@/domain/result';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { Engine } from '@/entities/paperwork/engine';
import { type ActDeps, performAct } from '../../act/perform-act';
import { engineFaults } from '../engine-fields';
import { correctDrafts } from './correct-drafts';

/** Whether officials accepted paperwork of an engine that still declares it. */
export const IS_ACCEPTED = `select 1 as n from public.paperwork p
  where p.engine_id = ? and p.state <> 'withdrawn' and exists (
    select from record.paperwork_decision d where d.series_id = p.series_id
      and d.paperwork_id = p.id and d.decision = 'accepted')
  limit 1`;

/**
 * Puts right what the owner once wrote of an engine: castings and serial. Entered in the record with what
 * stood there before, and in the ledger of every series that knows the engine. Drafts follow where they
 * said the same; what was handed in keeps what it said. No more once paperwork of it is accepted.
 */
export const correctEngine = async (
  deps: ActDeps,
  actor: Actor,
  input: EngineFacts & {
    readonly act: string;
    readonly engineId: string;
    readonly version: number;
  },
): Promise<Result<null, Failure>> => {
  const { act: id, engineId, version } = input;
  const now: EngineFacts = {
    blockCasting: input.blockCasting.trim(),
    headCastings: input.headCastings.trim(),
    serial: input.serial.trim(),
  };
  const own = { id: engineId, ownerId: actor.personId };
  const known = isId(engineId) ? await deps.db.findOne(Engine, own) : null;
  if (known === null) return fail(absent());
  const { reference } = known;
  const layout = known.layout as unknown as BoreLayout;
  const faults = engineFaults({ reference, layout, ...now });
  if (faults.length > 0) return fail(invalid(faults));
  return performAct(
    deps,
    actor,
    { id, kind: 'correct-engine', seriesId: null, input: { engineId, version, ...now } },
    async (act) => {
      const { em } = act;
      const engine = await em.findOne(Engine, own, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (engine === null) return fail(absent());
      if (engine.version !== version) return fail(stale());
      const { blockCasting, headCastings, serial } = engine;
      const before: EngineFacts = { blockCasting, headCastings, serial };
      if (sameFacts(before, now)) {
        const detail = 'That is what stands there. Change what is wrong.';
        return fail(invalid([{ pointer: '/blockCasting', detail }]));
      }
      if ((await em.execute<unknown[]>(IS_ACCEPTED, [engineId])).length > 0) {
        const detail =
          'Paperwork of this engine was accepted with these numbers. Withdraw it first, or ask the race office.';
        return fail(failure('not-in-this-state', detail));
      }
      Object.assign(engine, now);
      await correctDrafts(em, { engineId, competitorId: actor.personId, before, now });
      const correction = deps.random.uuid();
      act.append('engine_correction', [
        {
          id: correction,
          engine_id: engineId,
          block_casting_before: before.blockCasting,
          head_castings_before: before.headCastings,
          serial_before: before.serial,
          block_casting: now.blockCasting,
          head_castings: now.headCastings,
          serial: now.serial,
          corrected_by: actor.personId,
        },
      ]);
      const series = await em.execute<{ id: string }[]>(
        'select s as id from append.series_of_engine(?, ?, ?) s order by s',
        [engineId, actor.personId, actor.personId],
      );
      for (const { id: seriesId } of series) {
        act.line({
          seriesId,
          kind: 'engine-corrected',
          contents: { correction: { text: canonicalJson({ before, now }), open: false } },
          refs: { engine: engineId, correction },
        });
      }
      return ok(null);
    },
  );
};
