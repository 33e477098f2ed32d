import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { eraseLines, listErasable } from './erase-lines';
import { findErasureObstacle } from './obstacle';

/** Erases the pen strokes beside the signatures on an inspection's reports. The signatures stand. */
export const eraseStrokes = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly inspectionId: string;
    /** Published in the ledger: it names no person. */
    readonly reason: string;
  },
): Promise<Result<{ readonly contents: number }, Failure>> => {
  const { act: id, seriesId, inspectionId } = input;
  if (!may(actor, 'series.administer', seriesId) || !isId(inspectionId)) return fail(absent());
  if ((await deps.db.findOne(Inspection, { seriesId, id: inspectionId })) === null)
    return fail(absent());
  const reason = input.reason.trim();
  if (reason.length < 10 || reason.length > 500) {
    const detail = 'Say in 10 to 500 characters why they are erased, without naming anybody.';
    return fail(invalid([{ pointer: '/reason', detail }]));
  }
  return performAct(
    deps,
    actor,
    { id, kind: 'erase-strokes', seriesId, input: { inspectionId, reason } },
    async (act) => {
      const subject = { kind: 'inspection', id: inspectionId } as const;
      const obstacle = await findErasureObstacle(act.em, seriesId, subject);
      if (obstacle !== undefined) return fail(failure('not-in-this-state', obstacle));
      const contents = await listErasable(act.em, seriesId, subject);
      if (contents.length === 0)
        return fail(failure('not-in-this-state', 'There are no pen strokes here to be erased.'));
      await eraseLines(act, { seriesId, subject, reason, contents });
      return ok({ contents: contents.length });
    },
  );
};
