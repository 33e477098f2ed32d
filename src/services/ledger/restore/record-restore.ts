import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { findLostHeads } from './lost-heads';

export interface RestoreRecorded {
  /** How many series went on with fewer lines than were signed. */
  readonly series: number;
}

/**
 * Says in every ledger that is behind its last signed head that lines were lost, how many and why.
 * From then on the record is written again. A series that the database does not know at all has no
 * ledger to say it in: its head is set aside where it is remembered.
 */
export const recordRestore = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'heads' | 'recordState'>,
  actor: Actor,
  input: { readonly act: string; readonly reason: string },
): Promise<Result<RestoreRecorded, Failure>> => {
  if (!actor.siteAdmin) return fail(absent());
  const reason = input.reason.trim();
  if (reason.length < 10 || reason.length > 2000)
    return fail(
      invalid([
        { pointer: '/reason', detail: 'Say in 10 to 2000 characters what was restored, and why.' },
      ]),
    );
  const lost = await findLostHeads(deps);
  const present = lost.filter((head) => head.present !== undefined);
  const done = await performAct(
    deps,
    actor,
    {
      id: input.act,
      kind: 'record-restore',
      seriesId: null,
      input: { reason },
      whileReadOnly: true,
    },
    async ({ line, at }) => {
      if (lost.length === 0)
        return fail(failure('not-in-this-state', 'No ledger is behind its last signed head.'));
      // In one order, so that two administrators at once wait for each other.
      const ordered = [...present].sort((a, b) => (a.seriesId < b.seriesId ? -1 : 1));
      for (const { seriesId, size, root, present: kept } of ordered) {
        const text = canonicalJson({
          document: 'tagwire/restore',
          version: '1',
          reason,
          recordedAt: at.toISOString(),
          kept: String(kept),
          lostSize: String(size),
          lostRoot: root,
        });
        line({
          seriesId,
          kind: 'restore-recorded',
          contents: { restore: { text, open: true } },
          refs: { 'lost-size': String(size), 'lost-root': root },
        });
      }
      return ok({ series: present.length });
    },
  );
  if (!done.ok) return done;
  for (const head of lost)
    if (head.present === undefined) await deps.heads.setAside(head.seriesId, `lost-${head.size}`);
  deps.recordState.doubt();
  return done;
};
