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

/** The stored heads as they stand. */
export const readHeads = (em: EntityManager, seriesId: string) =>
  em.execute<{ size: string; root: string; note: string }[]>(
    `select size, encode(root, 'hex') as root, note from record.checkpoint
     where series_id = ? order by size`,
    [seriesId],
  );

/** One signed head against the tree that was grown anew. */
export const headFaults = (
  head: {
    readonly note: string;
    readonly what: string;
    readonly stored?: { size: string; root: string };
  },
  seriesId: string,
  keys: readonly VerifierKey[],
  grown: { readonly size: number; readonly roots: ReadonlyMap<number, string> },
): readonly AuditFault[] => {
  const { note, what, stored } = head;
  const opened = openCheckpoint(note, keys);
  if (!opened.ok) return [inHead(what, opened.failure.detail)];
  const { size, root, origin } = opened.value;
  const faults: AuditFault[] = [];
  if (!isOriginOf(origin, seriesId)) faults.push(inHead(what, 'It is of another series.'));
  if (stored && (Number(stored.size) !== size || stored.root !== toHex(root)))
    faults.push(inHead(what, 'The columns do not say what the signed note says.'));
  if (size > grown.size)
    faults.push(
      inHead(what, `It was signed over ${size} lines; ${size - grown.size} of them are gone.`),
    );
  else if (grown.roots.get(size) !== toHex(root))
    faults.push(inHead(what, `The first ${size} lines are not those it was signed over.`));
  return faults;
};
