import type { EntityManager } from '@mikro-orm/postgresql';
import { toHex } from '@/domain/ledger/bytes';
import type { Ports } from '../../ports';

export interface StoredCheckpoint {
  readonly size: number;
  /** Hexadecimal. */
  readonly root: string;
  /** The signed note, byte for byte. */
  readonly note: string;
  readonly signedAt: string;
}

interface Row {
  readonly size: string;
  readonly root: Buffer;
  readonly note: string;
  readonly signed_at: Date;
}

const stored = (row: Row): StoredCheckpoint => ({
  size: Number(row.size),
  root: toHex(new Uint8Array(row.root)),
  note: row.note,
  signedAt: new Date(row.signed_at).toISOString(),
});

const select = 'select size, root, note, signed_at from record.checkpoint where series_id = ?';

/** The newest signed head of a series. */
export const findLatest = async (
  em: EntityManager,
  seriesId: string,
): Promise<StoredCheckpoint | undefined> => {
  const [row] = await em.execute<Row[]>(`${select} order by size desc limit 1`, [seriesId]);
  return row && stored(row);
};

/** The signed head of exactly this size. */
export const findOfSize = async (
  em: EntityManager,
  seriesId: string,
  size: number,
): Promise<StoredCheckpoint | undefined> => {
  const [row] = await em.execute<Row[]>(`${select} and size = ?`, [seriesId, size]);
  return row && stored(row);
};

/** The first signed head that covers a line. */
export const findCovering = async (
  em: EntityManager,
  seriesId: string,
  index: number,
): Promise<StoredCheckpoint | undefined> => {
  const [row] = await em.execute<Row[]>(`${select} and size > ? order by size limit 1`, [
    seriesId,
    index,
  ]);
  return row && stored(row);
};

/** The newest signed heads, the newest first. */
export const listCheckpoints = async (
  em: EntityManager,
  seriesId: string,
  most: number,
): Promise<readonly StoredCheckpoint[]> => {
  const rows = await em.execute<Row[]>(`${select} order by size desc limit ?`, [seriesId, most]);
  return rows.map(stored);
};

/** What a public page's foot says of the record; nothing before the first head is signed. */
export const findLatestCheckpoint = async (
  deps: Pick<Ports, 'db'>,
  seriesId: string,
): Promise<(StoredCheckpoint & { readonly number: number }) | undefined> => {
  const latest = await findLatest(deps.db, seriesId);
  if (latest === undefined) return undefined;
  const [row] = await deps.db.execute<{ number: string }[]>(
    'select count(*) as number from record.checkpoint where series_id = ?',
    [seriesId],
  );
  return { ...latest, number: Number(row?.number) };
};
