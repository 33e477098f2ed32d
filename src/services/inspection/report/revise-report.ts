import { LockMode } from '@mikro-orm/core';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { nextState } from '@/domain/inspection/state';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import type { InspectionNow } from '../assign-inspector';
import { findInspectionRow, worksOn } from '../read/find-inspection';

/**
 * Opens a signed report for correction, with its reason. Until the next revision is signed, strikes,
 * moves and readings count again; the signed report stays as it is.
 */
export const reviseReport = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: { readonly act: string; readonly inspectionId: string; readonly reason: string },
): Promise<Result<InspectionNow, Failure>> => {
  const { act, inspectionId } = input;
  const reason = input.reason.trim();
  const seen = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (seen === null || !worksOn(actor, seen)) return fail(absent());
  const { seriesId } = seen;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'revise-report', seriesId, input: { inspectionId, reason } },
    async ({ em }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const next = nextState(inspection.state, 'correct', reason);
      if (!next.ok) return next;
      if (inspection.correctionReason !== '')
        return fail(failure('not-in-this-state', 'A correction is open already. Sign it first.'));
      inspection.correctionReason = reason;
      await em.flush();
      return ok({ state: inspection.state, version: inspection.version });
    },
  );
};
