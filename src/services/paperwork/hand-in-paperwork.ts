import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { missingFaults } from '@/domain/paperwork/missing-faults';
import { isWritable, NOT_AN_APPROVAL, STATE_WORDS } from '@/domain/paperwork/state';
import { isComplete } from '@/domain/paperwork/still-missing';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { type CheckedPaperwork, checkRow, findOwnRow, noRules } from './check-paperwork';
import { findOwnPaperwork, isId } from './own-paperwork';
import type { PaperworkRow } from './read/read-row';

export interface Receipt {
  readonly number: number;
  readonly hash: string;
  readonly rulesHash: string;
  readonly receivedAt: string;
}

const documentOf = (row: PaperworkRow, checked: CheckedPaperwork): PaperworkDocument => {
  const { declared } = checked;
  const { engineId: id, reference, layout, blockCasting, headCastings, serial } = row;
  return {
    document: 'tagwire/paperwork',
    version: '1',
    series: row.seriesName,
    season: row.seasonName,
    className: row.className,
    competitor: row.competitorName,
    carNumber: row.carNumber,
    engine: { id, reference, layout, blockCasting, headCastings, serial },
    rulesHash: toHex(checked.standing.hash),
    answers: declared.answers,
    sheets: declared.sheets,
    photographs: declared.photographs,
    files: declared.files,
    note: row.draft.note,
  };
};

/**
 * Freezes the saved draft as the next version: kept for good with its hash and the rules it was
 * checked against, entered in the ledger, and receipted by e-mail. Versions before stay as they are.
 */
export const handInPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: { readonly act: string; readonly paperworkId: string; readonly version: number },
): Promise<Result<Receipt, Failure>> => {
  const { act: id, paperworkId, version } = input;
  if (!isId(paperworkId)) return fail(absent());
  const known = await findOwnPaperwork(deps.db, actor, paperworkId);
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'hand-in-paperwork', seriesId, input: { paperworkId, version } },
    async (act) => {
      const { em, at } = act;
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true);
      const row = await findOwnRow(em, actor, paperworkId);
      if (paperwork === undefined || row === undefined) return fail(absent());
      if (!isWritable(paperwork.state)) {
        const detail = `This paperwork is ${STATE_WORDS[paperwork.state].toLowerCase()} already.`;
        return fail(failure('not-in-this-state', detail));
      }
      if (paperwork.version !== version) return fail(stale());
      const checked = await checkRow(em, row, at);
      if (checked === undefined) return fail(noRules());
      if (!isComplete(checked.missing)) return fail(invalid(missingFaults(checked.missing)));

      const document = canonicalJson(toDocument(documentOf(row, checked)));
      const hash = sha256(utf8(document));
      const number = paperwork.versions + 1;
      const rulesHash = await act.keepRules(seriesId, checked.standing.document);
      Object.assign(paperwork, { state: 'handed-in', versions: number, updatedAt: at });
      paperwork.updatedBy = actor.personId;
      act.append('paperwork_version', [
        {
          series_id: seriesId,
          paperwork_id: paperworkId,
          number,
          document,
          hash,
          rules_hash: new Uint8Array(rulesHash),
          handed_in_by: actor.personId,
          occurred_at: at.toISOString(),
        },
      ]);
      const receipt = { number, hash: toHex(hash), rulesHash: toHex(checked.standing.hash) };
      queueMail(deps, em, act, {
        seriesId,
        personId: actor.personId,
        address: row.competitorEmail,
        kind: 'paperwork-receipt',
        subject: `Receipt: paperwork of ${row.reference} for car ${row.carNumber}, version ${number}`,
        paragraphs: [
          `The paperwork of engine ${row.reference} for car ${row.carNumber} in ${row.className}, ${row.seriesName}, was handed in as version ${number} on ${at.toISOString()}.`,
          `Its SHA-256 is ${receipt.hash}. It was checked against the rules with the SHA-256 ${receipt.rulesHash}.`,
          'The officials will accept it or return it with remarks. This version is kept whatever follows.',
          NOT_AN_APPROVAL,
        ],
        link: { label: 'See what was handed in', path: `/paddock/paperwork/${paperworkId}` },
        receipt: { seriesId, actId: id, of: 'this paperwork', sha256: receipt.hash },
      });
      act.line({
        seriesId,
        kind: 'paperwork-handed-in',
        contents: { paperwork: { text: document, open: false } },
        refs: {
          paperwork: paperworkId,
          number: String(number),
          hash: receipt.hash,
          rules: receipt.rulesHash,
        },
      });
      return ok({ ...receipt, receivedAt: at.toISOString() });
    },
  );
};
