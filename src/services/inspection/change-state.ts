import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { type InspectionAct, nextState } from '@/domain/inspection/state';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import type { InspectionNow } from './assign-inspector';
import { changeLine } from './change-line';
import { interestsIn } from './interest';
import { findInspectionRow, worksOn } from './read/find-inspection';

export type StateAct = Exclude<InspectionAct, 'close' | 'correct'>;

/** What an official may order without being the inspector. */
const OFFICIALS_ACTS: readonly StateAct[] = ['refuse', 'stop', 'defer', 'resume'];

/** Opens, holds, refuses, stops, defers or takes up an inspection; each is an act of the same inspection. */
export const changeState = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly inspectionId: string;
    readonly to: StateAct;
    readonly reason: string;
    /** Where it goes on or is kept, when that is not the event's own barn. */
    readonly place?: string | undefined;
    /** Numbers of seals put on or found, and the state they were found in. */
    readonly seals?: string | undefined;
    /** Number of the bag or crate the parts went into or came out of. */
    readonly bag?: string | undefined;
  },
): Promise<Result<InspectionNow, Failure>> => {
  const { act, inspectionId, to } = input;
  const reason = input.reason.trim();
  const said = {
    place: input.place?.trim() ?? '',
    seals: input.seals?.trim() ?? '',
    bag: input.bag?.trim() ?? '',
  };
  const seen = await findInspectionRow(deps.db, actor, 'inspection.read', inspectionId);
  if (seen === null) return fail(absent());
  const { seriesId } = seen;
  const ordered = may(actor, 'inspection.assign', seriesId) && OFFICIALS_ACTS.includes(to);
  if (!worksOn(actor, seen) && !ordered) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'change-inspection', seriesId, input: { inspectionId, to, reason, ...said } },
    async ({ em, at, line }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const next = nextState(inspection.state, to, reason);
      if (!next.ok) return next;
      if (to === 'open' && !inspection.inspectorId)
        return fail(failure('not-in-this-state', 'Name an inspector before the first bolt.'));
      if (to === 'open' || to === 'resume') {
        const interest = (await interestsIn(em, inspection)).get(actor.personId);
        if (interest !== undefined && !ordered)
          return fail(
            failure(
              'conflict-of-interest',
              `You cannot inspect this car: ${actor.name} ${interest}.`,
            ),
          );
      }
      inspection.state = next.value;
      inspection.stateReason = reason;
      if (said.place !== '' || to === 'resume') inspection.place = said.place;
      if (inspection.state === 'open') inspection.openedAt ??= at;
      await em.flush();
      line(changeLine(inspection, { change: to, reason, by: actor.personId, ...said }));
      return ok({ state: inspection.state, version: inspection.version });
    },
  );
};
