import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { changeLine } from './change-line';
import { findInspectionRow } from './read/find-inspection';
import { takeSeat } from './take-seat';

export interface InspectionNow {
  readonly state: string;
  readonly version: number;
}

/**
 * Names the inspector and the bay. Nobody with an interest in the car is taken. Who is named is a
 * line of the ledger; once it is open, it is handed over instead.
 */
export const assignInspector = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly inspectionId: string;
    readonly inspectorId: string | null;
    readonly bay: string;
    /** Of the inspection as it was opened by the one who assigns. */
    readonly version: number;
  },
): Promise<Result<InspectionNow, Failure>> => {
  const { act, inspectionId, inspectorId, version } = input;
  const bay = input.bay.trim();
  const seen = await findInspectionRow(deps.db, actor, 'inspection.read', inspectionId);
  if (seen === null || !may(actor, 'inspection.assign', seen.seriesId)) return fail(absent());
  const { seriesId } = seen;
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'assign-inspector',
      seriesId,
      input: { inspectionId, inspectorId, bay, version },
    },
    async ({ em, line }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (inspection.version !== version) return fail(stale());
      if (inspection.state === 'closed')
        return fail(failure('not-in-this-state', 'The report is signed and closed.'));
      const before = inspection.inspectorId ?? null;
      const changes = inspectorId !== before;
      if (changes && inspection.openedAt && before !== null)
        return fail(
          failure(
            'not-in-this-state',
            'This inspection has been opened. Hand it over, with the reason.',
          ),
        );
      inspection.bay = bay;
      if (changes) {
        if (inspectorId === null) inspection.inspectorId = null;
        else {
          const seated = await takeSeat(em, inspection, inspectorId);
          if (!seated.ok) return seated;
        }
        line(
          changeLine(inspection, {
            change: 'assign',
            reason: '',
            by: actor.personId,
            inspector: inspectorId ?? '',
            inspectorBefore: before ?? '',
          }),
        );
      }
      await em.flush();
      return ok({ state: inspection.state, version: inspection.version });
    },
  );
};
