import { LockMode } from '@mikro-orm/core';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid, stale } from '@/domain/failure';
import { nextState } from '@/domain/inspection/state';
import { areStrokes, strokesDocument } from '@/domain/inspection/strokes';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { interestsIn } from '../interest';
import { findInspectionRow, worksOn } from '../read/find-inspection';
import { getInspectionFile } from '../read/inspection-file';
import { buildReport } from './build-report';
import { readReports } from './read-reports';
import { signatureDocument } from './signature-document';

/** How long an authentication counts as fresh: a signature is one, over the report's hash. */
export const FRESH_MINUTES = 15;

export const isFresh = (actor: Pick<Actor, 'authenticatedAt'>, now: Date): boolean =>
  now.getTime() - Date.parse(actor.authenticatedAt) <= FRESH_MINUTES * 60_000;

export interface Signed {
  readonly revision: number;
  /** SHA-256 of the report's document, hexadecimal. */
  readonly hash: string;
}

/**
 * Signs the report as the rows stand and closes the inspection. `head` is the chain's head as the
 * signer saw it: if anything came in since, nothing is signed. A correction becomes the next
 * revision, with its reason; the ones before it stay. Pen strokes are kept beside the signature,
 * which is the fresh authentication with or without them.
 */
export const signReport = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly inspectionId: string;
    readonly head: string;
    readonly strokes?: readonly string[] | undefined;
  },
): Promise<Result<Signed, Failure>> => {
  const { act, inspectionId, head, strokes = [] } = input;
  const seen = await findInspectionRow(deps.db, actor, 'inspection.record', inspectionId);
  if (seen === null || !worksOn(actor, seen)) return fail(absent());
  if (!isFresh(actor, deps.clock.now()))
    return fail(
      failure(
        'fresh-sign-in-required',
        `A signature needs a sign-in of the last ${FRESH_MINUTES} minutes. Sign in once more, then sign the report.`,
      ),
    );
  if (strokes.length > 0 && !areStrokes(strokes)) {
    const detail =
      'These are no pen strokes of the pad. Clear it and sign again, or leave it empty.';
    return fail(invalid([{ pointer: '/strokes', detail }]));
  }
  const { seriesId } = seen;
  const drawn = strokes.length > 0 ? { strokes: [...strokes] } : {};
  return performAct(
    deps,
    actor,
    { id: act, kind: 'sign-report', seriesId, input: { inspectionId, head, ...drawn } },
    async ({ em, at, append, line }) => {
      const inspection = await em.findOneOrFail(
        Inspection,
        { seriesId, id: inspectionId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      const interest = (await interestsIn(em, inspection)).get(actor.personId);
      if (interest !== undefined)
        return fail(failure('conflict-of-interest', `${actor.name} ${interest} and cannot sign.`));
      const reason = inspection.correctionReason;
      const correcting = inspection.state === 'closed' && reason !== '';
      if (!correcting) {
        const next = nextState(inspection.state, 'close', '');
        if (!next.ok) return next;
      }
      const file = await getInspectionFile(em, inspection);
      if (toHex(file.chain.head) !== head) return fail(stale());
      const before = (await readReports(em, seriesId, inspectionId)).at(-1);
      const number = (before?.revision ?? 0) + 1;
      const document = await buildReport(em, file, {
        signer: { id: actor.personId, name: actor.name },
        revision: { number, reason, ...(before === undefined ? {} : { corrects: before.hash }) },
        signedAt: at.toISOString(),
      });
      const hash = sha256(utf8(document));
      append('report', [
        {
          series_id: seriesId,
          inspection_id: inspectionId,
          revision: number,
          document,
          hash,
          chain_head: file.chain.head,
          rules_hash: new Uint8Array(inspection.rulesHash),
          reason,
          signed_by: actor.personId,
          signature: {
            kind: 'fresh-authentication',
            authenticatedAt: actor.authenticatedAt,
            session: actor.sessionId,
          },
          signed_at: at.toISOString(),
        },
      ]);
      const pen = strokes.length === 0 ? undefined : strokesDocument(toHex(hash), strokes);
      if (pen !== undefined)
        append('signature_strokes', [
          { series_id: seriesId, inspection_id: inspectionId, revision: number, strokes: pen },
        ]);
      inspection.state = 'closed';
      inspection.stateReason = '';
      inspection.correctionReason = '';
      inspection.closedAt = at;
      line({
        seriesId,
        kind: number === 1 ? 'report-signed' : 'report-revised',
        contents: {
          report: { text: document, open: false },
          signature: { text: signatureDocument(actor, hash, at), open: false },
          ...(pen !== undefined && { strokes: { text: pen, open: false } }),
        },
        refs: {
          inspection: inspectionId,
          revision: String(number),
          chain: head,
          rules: toHex(inspection.rulesHash),
        },
      });
      return ok({ revision: number, hash: toHex(hash) });
    },
  );
};
