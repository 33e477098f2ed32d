import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { listInspectors } from './list-inspectors';
import { findInspectionRow } from './read/find-inspection';

export interface InspectionNow {
  readonly state: string;
  readonly version: number;
}

/** Names the inspector and the bay. Nobody with an interest in the car is taken. */
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
    async ({ em }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (inspection.version !== version) return fail(stale());
      if (inspection.state === 'closed')
        return fail(failure('not-in-this-state', 'The report is signed and closed.'));
      if (inspectorId !== null && inspectorId !== inspection.inspectorId) {
        const offered = await listInspectors({ db: em }, inspection);
        const chosen = offered.find((person) => person.id === inspectorId);
        if (chosen === undefined)
          return fail(
            invalid([{ pointer: '/inspectorId', detail: 'Choose an inspector of this series.' }]),
          );
        if (chosen.interest !== undefined)
          return fail(
            failure(
              'conflict-of-interest',
              `${chosen.name} ${chosen.interest} and cannot inspect this car. Choose somebody else.`,
            ),
          );
      }
      inspection.inspectorId = inspectorId;
      inspection.bay = bay;
      await em.flush();
      return ok({ state: inspection.state, version: inspection.version });
    },
  );
};
