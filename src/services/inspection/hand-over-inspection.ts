import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import type { InspectionNow } from './assign-inspector';
import { changeLine } from './change-line';
import { findInspectionRow, worksOn } from './read/find-inspection';
import { takeSeat } from './take-seat';

/**
 * Hands an inspection that has been opened to another inspector: by the one who has it, the chief or
 * an official, with the reason. It stays the same inspection; every reading keeps who took it.
 */
export const handOverInspection = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly inspectionId: string;
    readonly inspectorId: string;
    readonly reason: string;
  },
): Promise<Result<InspectionNow, Failure>> => {
  const { act, inspectionId, inspectorId } = input;
  const reason = input.reason.trim();
  const seen = await findInspectionRow(deps.db, actor, 'inspection.read', inspectionId);
  if (seen === null) return fail(absent());
  const { seriesId } = seen;
  if (!worksOn(actor, seen) && !may(actor, 'inspection.assign', seriesId)) return fail(absent());
  if (reason === '')
    return fail(invalid([{ pointer: '/handOverReason', detail: 'Write why it is handed over.' }]));
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'hand-over-inspection',
      seriesId,
      input: { inspectionId, inspectorId, reason },
    },
    async ({ em, line }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (inspection.state === 'closed' && inspection.correctionReason === '')
        return fail(failure('not-in-this-state', 'The report is signed and closed.'));
      const before = inspection.inspectorId ?? '';
      if (before === inspectorId)
        return fail(invalid([{ pointer: '/inspectorId', detail: 'They have it already.' }]));
      const seated = await takeSeat(em, inspection, inspectorId);
      if (!seated.ok) return seated;
      await em.flush();
      line(
        changeLine(inspection, {
          change: 'hand-over',
          reason,
          by: actor.personId,
          inspector: inspectorId,
          inspectorBefore: before,
        }),
      );
      return ok({ state: inspection.state, version: inspection.version });
    },
  );
};
