import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { findOwnPaperwork } from './own-paperwork';
import { readPaperwork } from './read/read-row';

const MOST = 500;

/**
 * Takes paperwork back. What was handed in is kept and its versions stay readable to the parties; it
 * just no longer declares the engine. Not while a car is picked on it and the inspection is not closed.
 */
export const withdrawPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly paperworkId: string;
    readonly version: number;
    readonly reason: string;
  },
): Promise<Result<null, Failure>> => {
  const { act: id, paperworkId, version } = input;
  const reason = input.reason.trim();
  if (!isId(paperworkId)) return fail(absent());
  const known = await findOwnPaperwork(deps.db, actor, paperworkId, false, 'hand-in');
  if (known === undefined) return fail(absent());
  if (reason.length > MOST) {
    const detail = `At most ${MOST} characters.`;
    return fail(invalid([{ pointer: '/reason', detail }]));
  }
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'withdraw-paperwork', seriesId, input: { paperworkId, version, reason } },
    async (act) => {
      const { em, at } = act;
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, 'hand-in');
      if (paperwork === undefined) return fail(absent());
      if (paperwork.version !== version) return fail(stale());
      const { state, versions } = paperwork;
      if (state === 'withdrawn')
        return fail(failure('not-in-this-state', 'This paperwork is withdrawn already.'));
      const [resting] = await em.execute<{ car: string }[]>(
        `select e.car_number as car from public.inspection i
         join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
         where i.series_id = ? and i.paperwork_id = ? and i.state <> 'closed' limit 1`,
        [seriesId, paperworkId],
      );
      if (resting !== undefined) {
        const detail = `Car ${resting.car} is picked and its inspection goes by this paperwork. It can be withdrawn once that is closed.`;
        return fail(failure('not-in-this-state', detail));
      }
      Object.assign(paperwork, { state: 'withdrawn', updatedAt: at, updatedBy: actor.personId });
      // A draft that was never handed in concerns nobody else.
      if (versions === 0) return ok(null);
      act.append('paperwork_withdrawal', [
        {
          series_id: seriesId,
          paperwork_id: paperworkId,
          number: versions,
          state_before: state,
          reason,
          withdrawn_by: actor.personId,
        },
      ]);
      const [row] = await readPaperwork(em, 'p.series_id = ? and p.id = ?', [
        seriesId,
        paperworkId,
      ]);
      if (row !== undefined) {
        queueMail(deps, em, act, {
          seriesId,
          personId: row.competitorId,
          address: row.competitorEmail,
          kind: 'paperwork-withdrawn',
          subject: `Withdrawn: paperwork of ${row.reference} for car ${row.carNumber}`,
          paragraphs: [
            `The paperwork of engine ${row.reference} for car ${row.carNumber} in ${row.className} was withdrawn on ${at.toISOString()}.`,
            'What was handed in before is kept. The engine is no longer declared by it.',
          ],
          next: 'nothing to do. To race the engine again, hand its paperwork in anew.',
          link: { label: 'See it', path: `/paddock/paperwork/${paperworkId}` },
        });
      }
      act.line({
        seriesId,
        kind: 'paperwork-withdrawn',
        contents: { withdrawal: { text: canonicalJson({ before: state, reason }), open: false } },
        refs: { paperwork: paperworkId, number: String(versions) },
      });
      return ok(null);
    },
  );
};
