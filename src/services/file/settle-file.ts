import { toHex } from '@/domain/ledger/bytes';
import type { KeptFile } from '@/entities/paperwork/file';
import type { Act } from '../act/perform-act';
import type { Ports } from '../ports';
import { holdObject } from './content/hold-object';
import type { Judged } from './content/judge-bytes';

export type KeptAnswer =
  | {
      readonly fileId: string;
      readonly state: 'kept';
      readonly sha256: string;
      readonly bytes: number;
      readonly type: string;
      readonly keptAt: string;
    }
  | { readonly fileId: string; readonly state: 'refused'; readonly refusedBecause: string };

export type KeepDeps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'objects' | 'images'>;

/** The answer that a file carries already; nothing while it is only expected. */
export const answered = (file: KeptFile): KeptAnswer | undefined => {
  const { id: fileId, state, sha256, bytes, mediaType, keptAt, refusedBecause } = file;
  if (state === 'refused') return { fileId, state, refusedBecause: refusedBecause ?? '' };
  if (state !== 'kept' || !sha256 || !bytes || !mediaType || !keptAt) return undefined;
  const hex = Buffer.from(sha256).toString('hex');
  return { fileId, state, sha256: hex, bytes, type: mediaType, keptAt: keptAt.toISOString() };
};

export const refuseFile = (row: KeptFile, refusedBecause: string): KeptAnswer => {
  Object.assign(row, { state: 'refused', refusedBecause });
  return { fileId: row.id, state: 'refused', refusedBecause };
};

/**
 * Within an act, on the file's locked row: what is what it must be is kept byte for byte under its hash,
 * another is refused with the reason, and either way the first answer stays. The bytes are written here
 * alone, under their content's lock, so that an erasure meets them and their row or neither.
 */
export const settleFile = async (
  deps: Pick<Ports, 'objects'>,
  { em, at, send }: Pick<Act, 'em' | 'at' | 'send'>,
  row: KeptFile,
  { bytes, hash, facts }: Judged,
): Promise<KeptAnswer> => {
  const before = answered(row);
  if (before !== undefined) return before;
  if (!facts.ok) return refuseFile(row, facts.failure.detail);
  const { type, width, height } = facts.value;
  const [hex, { seriesId, id: fileId }] = [toHex(hash), row];
  const objectKey = `originals/${hex}`;
  await holdObject(deps, em, { hash: hex, key: objectKey, bytes, type });
  Object.assign(row, { state: 'kept', objectKey, mediaType: type, bytes: bytes.length });
  Object.assign(row, { sha256: Buffer.from(hash), width, height, keptAt: at });
  if (row.purpose === 'photograph' || row.purpose === 'finding')
    send('make-previews', { seriesId, fileId });
  const kept = { sha256: hex, bytes: bytes.length, type, keptAt: at.toISOString() };
  return { fileId, state: 'kept', ...kept };
};
