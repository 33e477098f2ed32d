import { md5 } from '@noble/hashes/legacy.js';
import { bigEndian, concat, sha256, toHex } from '../ledger/bytes';

export type Digest = (bytes: Uint8Array) => Uint8Array;

/** The digest RFC 3797 prescribes; kept for its published vector, not used for draws. */
export const rfcMd5: Digest = (bytes) => md5(bytes);

export interface Round {
  /** 0, 1, 2 … */
  readonly round: number;
  readonly digest: Uint8Array;
  /** How many were left to choose from. */
  readonly left: number;
  /** The digest as a whole number, modulo `left`: counts from the first one left, beginning at 0. */
  readonly remainder: number;
  /** The chosen number in the pool, beginning at 1. */
  readonly chosen: number;
}

/**
 * RFC 3797 section 4: round i hashes i ‖ key ‖ i, with i as two bytes, most significant first,
 * and takes the digest modulo the number left as a place among those left, in order.
 */
export const select = (
  key: Uint8Array,
  pool: number,
  count: number,
  digest: Digest = sha256,
): readonly Round[] => {
  if (!(Number.isInteger(pool) && Number.isInteger(count)) || count < 0 || count > pool) {
    throw new RangeError(`Cannot select ${count} of ${pool}.`);
  }
  if (pool > 65_535) throw new RangeError('A pool holds at most 65535.');
  const left = Array.from({ length: pool }, (_, i) => i + 1);
  return Array.from({ length: count }, (_, round) => {
    const counter = bigEndian(round, 2);
    const hash = digest(concat(counter, key, counter));
    const remainder = Number(BigInt(`0x${toHex(hash)}`) % BigInt(left.length));
    const before = left.length;
    const chosen = left.splice(remainder, 1)[0] ?? 0;
    return { round, digest: hash, left: before, remainder, chosen };
  });
};
