import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import { type ItemRemark, NOT_AN_APPROVAL, STATE_WORDS } from '@/domain/paperwork/state';
import { fail, ok, type Result } from '@/domain/result';
import { Paperwork } from '@/entities/paperwork/paperwork';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { readPaperwork } from './read/read-row';

export interface PaperworkDecision {
  readonly act: string;
  readonly paperworkId: string;
  /** The version that was looked at. */
  readonly number: number;
  readonly decision: 'accepted' | 'returned';
  readonly remarks: readonly ItemRemark[];
}

const tidy = (remarks: readonly ItemRemark[]): readonly ItemRemark[] =>
  remarks.map(({ item, text }) => ({ item, text: text.trim() })).filter(({ text }) => text !== '');

/** Accepts the version last handed in, or returns it with a remark beside each item that needs one. */
export const decidePaperwork = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: PaperworkDecision,
): Promise<Result<{ readonly state: 'accepted' | 'returned' }, Failure>> => {
  const open = seriesWhere(actor, 'paperwork.decide');
  const { act: id, paperworkId, number, decision } = input;
  if (!isId(paperworkId) || open.length === 0) return fail(absent());
  const where = { id: paperworkId, seriesId: { $in: [...open] }, versions: { $gt: 0 } };
  const known = await deps.db.findOne(Paperwork, where);
  if (known === null) return fail(absent());
  if (known.competitorId === actor.personId) {
    const detail = 'This paperwork is your own: another official decides.';
    return fail(failure('conflict-of-interest', detail));
  }
  const remarks = tidy(input.remarks);
  if (decision === 'returned' && remarks.length === 0) {
    const detail = 'Write at least one remark: what is to be put right before it comes back.';
    return fail(invalid([{ pointer: '/remarks', detail }]));
  }
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'decide-paperwork', seriesId, input: { paperworkId, number, decision, remarks } },
    async (act) => {
      const { em, at } = act;
      const paperwork = await em.findOneOrFail(Paperwork, where, {
        lockMode: LockMode.PESSIMISTIC_WRITE,
      });
      if (paperwork.versions !== number) return fail(stale());
      if (paperwork.state !== 'handed-in') {
        const detail = `This paperwork is ${STATE_WORDS[paperwork.state].toLowerCase()}: there is nothing to decide.`;
        return fail(failure('not-in-this-state', detail));
      }
      const [row] = await readPaperwork(em, 'p.series_id = ? and p.id = ?', [
        seriesId,
        paperworkId,
      ]);
      if (row === undefined) return fail(absent());
      // Answers belonged to the remarks before.
      const { replies: _replies, ...draft } = paperwork.draft;
      const decided = { state: decision, draft, updatedAt: at, updatedBy: actor.personId };
      Object.assign(paperwork, decided);
      act.append('paperwork_decision', [
        {
          series_id: seriesId,
          id: deps.random.uuid(),
          paperwork_id: paperworkId,
          number,
          decision,
          remarks,
          decided_by: actor.personId,
        },
      ]);
      queueMail(deps, em, act, {
        seriesId,
        personId: paperwork.competitorId,
        address: row.competitorEmail,
        kind: `paperwork-${decision}`,
        subject:
          decision === 'accepted'
            ? `Accepted: paperwork of ${row.reference} for car ${row.carNumber}`
            : `Returned: paperwork of ${row.reference} for car ${row.carNumber}`,
        paragraphs: [
          `Version ${number} of the paperwork of engine ${row.reference} for car ${row.carNumber} in ${row.className} was ${decision === 'accepted' ? 'accepted' : 'returned with remarks'}.`,
          ...remarks.map(({ text }) => text),
          ...(decision === 'accepted'
            ? [NOT_AN_APPROVAL]
            : ['What you wrote is still there, and the version before is kept.']),
        ],
        next:
          decision === 'accepted'
            ? 'nothing to do. Change the engine, and its paperwork is handed in again.'
            : 'put it right and hand it in again.',
        link: {
          label: decision === 'accepted' ? 'See it' : 'Put it right',
          path: `/paddock/paperwork/${paperworkId}`,
        },
      });
      act.line({
        seriesId,
        kind: 'paperwork-decided',
        contents: { decision: { text: canonicalJson({ decision, remarks }), open: false } },
        refs: { paperwork: paperworkId, number: String(number) },
      });
      return ok({ state: decision });
    },
  );
};
