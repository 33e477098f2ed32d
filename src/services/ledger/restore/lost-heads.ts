import type { EntityManager } from '@mikro-orm/postgresql';
import { sameBytes, toHex } from '@/domain/ledger/bytes';
import { peekCheckpoint } from '@/domain/ledger/checkpoint';
import type { Ports } from '../../ports';
import { findSize, readRoot } from '../nodes';

export interface LostHead {
  readonly seriesId: string;
  /** Lines under the head that was signed. */
  readonly size: number;
  /** Hexadecimal. */
  readonly root: string;
  /** Lines in the database; nothing when it has no ledger of the series at all. */
  readonly present: number | undefined;
}

type Remembered = { readonly seriesId: string; readonly note: string };

const headOf = ({ seriesId, note }: Remembered) => {
  const head = peekCheckpoint(note);
  if (!head.ok) throw new Error(`The remembered head of ${seriesId} is damaged.`);
  return head.value;
};

/**
 * Whether a recorded restore has said that this head’s lines were lost: by its root, or by a larger
 * head of the same loss, which another process remembers.
 */
const isRecorded = async (
  em: EntityManager,
  seriesId: string,
  { size, root }: { readonly size: number; readonly root: Uint8Array },
): Promise<boolean> => {
  const [row] = await em.execute<unknown[]>(
    `select 1 from record.ledger_line
     where series_id = ? and kind = 'restore-recorded'
       and ((index < ? and (line::jsonb #>> '{refs,lost-size}')::bigint >= ?)
            or line::jsonb #>> '{refs,lost-root}' = ?)
     limit 1`,
    [seriesId, size, size, toHex(root)],
  );
  return row !== undefined;
};

/** Whether the ledger does not begin with the lines under this head, and no restore says why. */
export const isLost = async (em: EntityManager, remembered: Remembered): Promise<boolean> => {
  const { seriesId } = remembered;
  const { size, root } = headOf(remembered);
  const present = await findSize(em, seriesId);
  const holds =
    present !== undefined && present >= size && sameBytes(await readRoot(em, seriesId, size), root);
  return !holds && !(await isRecorded(em, seriesId, { size, root }));
};

/** Every series whose ledger is behind, or apart from, the last head signed for it. */
export const findLostHeads = async (
  deps: Pick<Ports, 'db' | 'heads'>,
): Promise<readonly LostHead[]> => {
  const lost: LostHead[] = [];
  for (const remembered of await deps.heads.list()) {
    if (!(await isLost(deps.db, remembered))) continue;
    const { seriesId } = remembered;
    const { size, root } = headOf(remembered);
    lost.push({ seriesId, size, root: toHex(root), present: await findSize(deps.db, seriesId) });
  }
  return lost;
};
