import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import { missingFaults } from '@/domain/paperwork/missing-faults';
import { isWritable, NOT_AN_APPROVAL, STATE_WORDS } from '@/domain/paperwork/state';
import { isComplete } from '@/domain/paperwork/still-missing';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { type Act, performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { checkRow, findOwnRow, noRules } from './check-paperwork';
import { maySign, type SignedBy } from './may-sign';
import { findOwnPaperwork } from './own-paperwork';
import { paperworkDocument } from './paperwork-document';
import type { PaperworkRow } from './read/read-row';
import { tellOfficials } from './tell-officials';

export interface Receipt {
  readonly number: number;
  readonly hash: string;
  readonly rulesHash: string;
  readonly receivedAt: string;
}

export type HandInDeps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>;

interface Addressee {
  readonly personId: string | null;
  readonly address: string;
}

const sendReceipt = (
  deps: HandInDeps,
  { id: actId, em, ...act }: Act,
  row: PaperworkRow,
  { number, hash, rulesHash, receivedAt }: Receipt,
  to: Addressee,
  signedFor: boolean,
): void => {
  const { seriesId } = row;
  queueMail(deps, em, act, {
    seriesId,
    ...to,
    kind: 'paperwork-receipt',
    subject: `Receipt: paperwork of ${row.reference} for car ${row.carNumber}, version ${number}`,
    paragraphs: [
      `The paperwork of engine ${row.reference} for car ${row.carNumber} in ${row.className}, ${row.seriesName}, was handed in as version ${number} on ${receivedAt}.`,
      ...(signedFor ? [`It was signed for ${row.competitorName}, who is under age.`] : []),
      `Its SHA-256 is ${hash}. It was checked against the rules with the SHA-256 ${rulesHash}.`,
      'This version is kept whatever follows.',
      NOT_AN_APPROVAL,
    ],
    next: 'nothing to do now. The officials accept it or return it with remarks; you get a message.',
    link: { label: 'See what was handed in', path: `/paddock/paperwork/${row.id}` },
    receipt: { seriesId, actId, of: 'this paperwork', sha256: hash },
  });
};

/**
 * Freezes the saved draft as the next version: kept for good with its hash and the rules it was
 * checked against, entered in the ledger, and receipted by e-mail. Versions before stay as they are.
 * For a competitor under age the guardian signs; who signed for whom is kept beside the version.
 */
export const handInPaperwork = async (
  deps: HandInDeps,
  actor: Actor,
  input: { readonly act: string; readonly paperworkId: string; readonly version: number },
  by: SignedBy = 'session',
  also: (em: EntityManager) => Promise<Failure | undefined> = async () => undefined,
): Promise<Result<Receipt, Failure>> => {
  const { act: id, paperworkId, version } = input;
  if (!isId(paperworkId)) return fail(absent());
  const known = await findOwnPaperwork(deps.db, actor, paperworkId, false, 'see');
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id, kind: 'hand-in-paperwork', seriesId, input: { paperworkId, version } },
    async (act) => {
      const { em, at } = act;
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, 'hand-in');
      const row = await findOwnRow(em, actor, paperworkId, 'hand-in');
      if (paperwork === undefined || row === undefined) {
        const detail = 'The competitor lets you write here, not hand in. Tell them it is ready.';
        return fail(failure('not-in-this-state', detail));
      }
      if (!isWritable(paperwork.state)) {
        const detail = `This paperwork is ${STATE_WORDS[paperwork.state].toLowerCase()} already.`;
        return fail(failure('not-in-this-state', detail));
      }
      if (paperwork.version !== version) return fail(stale());
      const signed = await maySign(em, actor, paperwork, at, by);
      if (!signed.ok) return signed;
      const guardian = signed.value;
      const checked = await checkRow(em, row, at);
      if (checked === undefined) return fail(noRules());
      if (!isComplete(checked.missing)) return fail(invalid(missingFaults(checked.missing)));
      const refused = await also(em);
      if (refused !== undefined) return fail(refused);

      const document = canonicalJson(toDocument(paperworkDocument(row, checked)));
      const hash = sha256(utf8(document));
      const number = paperwork.versions + 1;
      const rulesHash = await act.keepRules(seriesId, checked.standing.document);
      Object.assign(paperwork, { state: 'handed-in', versions: number, updatedAt: at });
      paperwork.updatedBy = actor.personId;
      const key = { series_id: seriesId, paperwork_id: paperworkId, number };
      act.append('paperwork_version', [
        {
          ...key,
          document,
          hash,
          rules_hash: new Uint8Array(rulesHash),
          handed_in_by: actor.personId,
          occurred_at: at.toISOString(),
        },
      ]);
      const signature = guardian && {
        minor_id: guardian.minorId,
        guardian_id: actor.personId,
        method: by === 'session' ? 'fresh-sign-in' : by,
        authenticated_at: actor.authenticatedAt,
      };
      if (signature) act.append('guardian_signature', [{ ...key, ...signature }]);
      const receipt: Receipt = {
        number,
        hash: toHex(hash),
        rulesHash: toHex(checked.standing.hash),
        receivedAt: at.toISOString(),
      };
      const competitor = { personId: row.competitorId, address: row.competitorEmail };
      sendReceipt(deps, act, row, receipt, competitor, guardian !== undefined);
      if (guardian) {
        const own = { personId: actor.personId, address: guardian.guardianEmail };
        sendReceipt(deps, act, row, receipt, own, true);
      }
      await tellOfficials(deps, act, row, number);
      act.line({
        seriesId,
        kind: 'paperwork-handed-in',
        contents: {
          paperwork: { text: document, open: false },
          ...(signature && {
            signature: {
              text: canonicalJson({
                method: signature.method,
                at: signature.authenticated_at,
                minor: signature.minor_id,
                guardian: signature.guardian_id,
              }),
              open: false,
            },
          }),
        },
        refs: {
          paperwork: paperworkId,
          number: String(number),
          hash: receipt.hash,
          rules: receipt.rulesHash,
        },
      });
      return ok(receipt);
    },
  );
};
