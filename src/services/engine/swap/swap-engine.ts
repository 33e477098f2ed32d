import type { SwapRequest, SwapResponse } from '@/contracts/engine/swap';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { Inspection } from '@/entities/event/inspection';
import { Engine } from '@/entities/paperwork/engine';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { RaceClass } from '@/entities/series/race-class';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { findRules } from '../../rulebook/find-rules';
import { findSwappable } from './find-swappable';
import { swapMails } from './swap-mails';
import { swappedPaperwork } from './swapped-paperwork';
import { takeEngine } from './take-engine';

/**
 * Another engine in an entered car, at the track: engine, seal number and the hash of one photograph now,
 * the rest by a date that the class sets. Picks made after it go by the new engine; an inspection that was opened before stays
 * as it was opened.
 */
export const swapEngine = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: SwapRequest,
): Promise<Result<SwapResponse, Failure>> => {
  const { act: id, ...asked } = input;
  const { entryId, photograph } = asked;
  const seal = asked.seal.trim();
  const [known] = await findSwappable(deps, actor, entryId);
  if (known === undefined) return fail(absent());
  const { seriesId, competitorId, classId, carNumber } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'swap-engine', seriesId, input: asked },
    async (act) => {
      const { em, at } = act;
      const entry = await em.findOneOrFail(Entry, { seriesId, id: entryId });
      const before = entry.paperworkId
        ? await em.findOne(Paperwork, { seriesId, id: entry.paperworkId })
        : null;
      const fromId = entry.engineId ?? before?.engineId ?? null;
      const from = fromId === null ? null : await em.findOne(Engine, { id: fromId });
      const taken = await takeEngine(em, { asked: asked.engine, competitorId, from, at });
      if (!taken.ok) return taken;
      const engine = taken.value;
      if (engine.id === fromId) {
        const detail = `${engine.reference} is in car ${carNumber} already.`;
        return fail(invalid([{ pointer: '/engine', detail }]));
      }
      const standing = await findRules(em, seriesId, classId, at);
      if (standing === undefined) {
        const detail = `${known.className} has no rulebook in force: there is nothing to declare against.`;
        return fail(failure('not-in-this-state', detail));
      }
      const { paperworkId } = await swappedPaperwork(em, {
        id: asked.paperworkId,
        key: { seriesId, classId, carNumber, competitorId, engineId: engine.id },
        engine,
        rules: standing.rules,
        seal,
        by: actor.personId,
        at,
      });
      const inspected = (await em.count(Inspection, { seriesId, entryId })) > 0;
      const fromReference = entry.engineReference || from?.reference || '';
      Object.assign(entry, {
        engineReference: engine.reference,
        engineId: engine.id,
        paperworkId,
      });
      const { swapDueDays } = await em.findOneOrFail(RaceClass, { seriesId, id: classId });
      const dueAt = new Date(at.getTime() + swapDueDays * 86_400_000).toISOString();
      act.append('engine_swap', [
        {
          series_id: seriesId,
          id: asked.id,
          event_id: known.eventId,
          entry_id: entryId,
          car_number: carNumber,
          from_engine_id: fromId,
          from_reference: fromReference,
          to_engine_id: engine.id,
          to_reference: engine.reference,
          seal,
          photograph_id: photograph.fileId,
          photograph_sha256: `\\x${photograph.sha256}`,
          paperwork_id: paperworkId,
          due_at: dueAt,
          made_by: actor.personId,
        },
      ]);
      await swapMails(deps, act, known, { from: fromReference, to: engine.reference, seal, dueAt });
      const said = {
        car: carNumber,
        from: fromReference,
        to: engine.reference,
        seal,
        photograph: photograph.sha256,
        due: dueAt,
      };
      act.line({
        seriesId,
        kind: 'engine-swapped',
        contents: { swap: { text: canonicalJson(said), open: false } },
        refs: { event: known.eventId, entry: entryId, engine: engine.id, paperwork: paperworkId },
      });
      return ok({ paperworkId, dueAt, inspected });
    },
  );
};
