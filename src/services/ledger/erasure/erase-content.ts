import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { eraseLines, listErasable } from './erase-lines';
import { findErasureObstacle } from './obstacle';
import { readReason } from './read-reason';

/**
 * Erases what a paperwork says, for good: every version, its files, the remarks on it, why it was taken
 * back, who signed for whom, and of an engine that was swapped in its names and seal. The ledger stays
 * whole.
 */
export const eraseContent = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly paperworkId: string;
    /** Published in the ledger: it names no person. */
    readonly reason: string;
  },
): Promise<Result<{ readonly contents: number; readonly files: number }, Failure>> => {
  const { act: id, seriesId, paperworkId } = input;
  if (!may(actor, 'series.administer', seriesId) || !isId(paperworkId)) return fail(absent());
  const where = { seriesId, id: paperworkId };
  if ((await deps.db.findOne(Paperwork, where)) === null) return fail(absent());
  const said = readReason(input.reason, 'why it is erased, without naming anybody');
  if (!said.ok) return said;
  const reason = said.value;
  return performAct(
    deps,
    actor,
    { id, kind: 'erase-content', seriesId, input: { paperworkId, reason } },
    async (act) => {
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE } as const;
      const { versions } = await act.em.findOneOrFail(Paperwork, where, lock);
      const subject = { kind: 'paperwork', id: paperworkId } as const;
      const obstacle = await findErasureObstacle(act.em, seriesId, subject);
      if (obstacle !== undefined) return fail(failure('not-in-this-state', obstacle));
      const contents = await listErasable(act.em, seriesId, subject);
      // A draft that nobody was given says nothing here.
      if (contents.length === 0 && versions === 0) return fail(absent());
      if (contents.length === 0)
        return fail(failure('not-in-this-state', 'This paperwork was erased already.'));
      const erased = await eraseLines(act, { seriesId, subject, reason, contents });
      return ok({ contents: erased.contents.length, files: erased.files.length });
    },
  );
};
