import { type Actor, may } from '@/domain/access/permission';
import type { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../../ports';
import { interestsIn } from '../interest';

/** Whether this person may take an independent second set of a car that is not theirs to inspect. */
export const mayTakeSecondSet = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  inspection: Pick<Inspection, 'seriesId' | 'id'>,
): Promise<boolean> =>
  may(actor, 'inspection.record', inspection.seriesId) &&
  !(await interestsIn(deps.db, inspection)).has(actor.personId);
