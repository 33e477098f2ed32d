import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { eraseWords } from './erase-words';
import { readReason } from './read-reason';

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
  const said = readReason(input.reason, 'why they are erased, without naming anybody');
  if (!said.ok) return said;
  const reason = said.value;
  return performAct(
    deps,
    actor,
    { id, kind: 'erase-strokes', seriesId, input: { inspectionId, reason } },
    async (act) => {
      const subject = { kind: 'inspection', id: inspectionId } as const;
      const nothing = 'There are no pen strokes here to be erased.';
      return eraseWords(act, { seriesId, subject, reason, nothing });
    },
  );
};
