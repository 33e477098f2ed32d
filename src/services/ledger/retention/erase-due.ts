import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { actIdFor } from '../../notice/act-id';
import type { Ports } from '../../ports';
import { eraseContent } from '../erasure/erase-content';
import { eraseDayWords } from '../erasure/erase-day-words';
import { eraseStrokes } from '../erasure/erase-strokes';
import { listDue } from './list-due';

/**
 * Erases what an official saw on the list and confirmed: each an act and a line of its own. What is no
 * longer due, or held by now, is left; so is what came onto the list since.
 */
export const eraseDue = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    /** Ids of paperwork, inspections and events, as they stood on the list. */
    readonly confirmed: readonly string[];
  },
): Promise<Result<{ readonly erased: number; readonly left: number }, Failure>> => {
  const { act, seriesId, confirmed } = input;
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  const wanted = new Set(confirmed);
  const due = await listDue(deps.db, seriesId, deps.clock.now());
  let erased = 0;
  for (const { kind, id, held, season, endedOn } of due) {
    if (!wanted.has(id) || held !== null) continue;
    const common = {
      act: actIdFor('erase-due', `${act} ${id}`),
      seriesId,
      reason: `Kept to the end of season ${season}, as the series has set: it ended on ${endedOn}.`,
    };
    const done =
      kind === 'paperwork'
        ? await eraseContent(deps, actor, { ...common, paperworkId: id })
        : kind === 'inspection'
          ? await eraseStrokes(deps, actor, { ...common, inspectionId: id })
          : await eraseDayWords(deps, actor, { ...common, eventId: id });
    // A hold or an inspection that came at this moment stops this one, not the others.
    if (done.ok) erased += 1;
    else if (done.failure.name !== 'not-in-this-state') return done;
  }
  return ok({ erased, left: wanted.size - erased });
};
