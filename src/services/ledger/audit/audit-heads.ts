import type { EntityManager } from '@mikro-orm/postgresql';
import { toHex } from '@/domain/ledger/bytes';
import { isOriginOf, openCheckpoint, peekCheckpoint } from '@/domain/ledger/checkpoint';
import { parseVerifierKey, type VerifierKey } from '@/domain/ledger/note/verifier-key';
import { followKeys } from '@/domain/ledger/verify/follow-keys';
import { findSeriesKeys } from '../proof/list-keys';
import { type AuditFault, faultIn } from './fault';

const inHead = faultIn('record.checkpoint');

/** From the keys that the auditor brings, or the first published one, along the hand-overs. */
export const auditKeys = async (
  em: EntityManager,
  seriesId: string,
  pinned: readonly string[],
): Promise<readonly VerifierKey[]> => {
  const published = (await findSeriesKeys({ db: em }, seriesId).catch(() => undefined))?.published;
  const first = published?.[0] && (JSON.parse(published[0].document) as { key: string }).key;
  const roots = (pinned.length > 0 ? pinned : [first ?? '']).flatMap((text) => {
    const key = parseVerifierKey(text);
    return key.ok ? [key.value] : [];
  });
  const later = (published ?? []).slice(1);
  return [...followKeys(roots, later).keys];
};

/** Sizes of the heads that are to be compared. */
export const sizesOf = (notes: readonly string[]): ReadonlySet<number> =>
  new Set(
    notes.flatMap((note) => {
      const head = peekCheckpoint(note);
      return head.ok ? [head.value.size] : [];
    }),
  );

interface StoredHead {
  readonly size: string;
  readonly root: string;
  /** To the microsecond, `2027-05-01T16:00:03.000000Z`. */
  readonly signedAt: string | null;
}

/** The stored heads as they stand. */
export const readHeads = (em: EntityManager, seriesId: string) =>
  em.execute<(StoredHead & { readonly note: string })[]>(
    `select size, encode(root, 'hex') as root, note,
            to_char(signed_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as "signedAt"
     from record.checkpoint
     where series_id = ? order by size`,
    [seriesId],
  );

/** One signed head against the tree that was grown anew. */
export const headFaults = (
  head: {
    readonly note: string;
    readonly what: string;
    readonly stored?: StoredHead;
  },
  seriesId: string,
  keys: readonly VerifierKey[],
  grown: { readonly size: number; readonly roots: ReadonlyMap<number, string> },
): readonly AuditFault[] => {
  const { note, what, stored } = head;
  const opened = openCheckpoint(note, keys);
  if (!opened.ok) return [inHead(what, opened.failure.detail)];
  const { size, root, origin, signedAt } = opened.value;
  const faults: AuditFault[] = [];
  if (!isOriginOf(origin, seriesId)) faults.push(inHead(what, 'It is of another series.'));
  if (stored && (Number(stored.size) !== size || stored.root !== toHex(root)))
    faults.push(inHead(what, 'The columns do not say what the signed note says.'));
  // Heads of before the time was signed hold none.
  if (stored && signedAt !== undefined && stored.signedAt !== signedAt.replace('Z', '000Z'))
    faults.push(inHead(what, 'The column does not say when the note says that it was signed.'));
  if (size > grown.size)
    faults.push(
      inHead(what, `It was signed over ${size} lines; ${size - grown.size} of them are gone.`),
    );
  else if (grown.roots.get(size) !== toHex(root))
    faults.push(inHead(what, `The first ${size} lines are not those it was signed over.`));
  return faults;
};
