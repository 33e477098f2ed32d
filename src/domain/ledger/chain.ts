import { concat, sha256, utf8 } from './bytes';
import { canonicalBytes, type Json } from './canonical';

const TAG = utf8('tagwire/chain/1');
const START = Uint8Array.of(0);
const LINK = Uint8Array.of(1);

/** h₀ = SHA-256("tagwire/chain/1" ‖ 0x00 ‖ inspection id), the id as lower-case text. */
export const chainStart = (inspectionId: string): Uint8Array =>
  sha256(concat(TAG, START, utf8(inspectionId)));

/** hᵢ = SHA-256("tagwire/chain/1" ‖ 0x01 ‖ hᵢ₋₁ ‖ SHA-256(canonical batch)). */
export const chainNext = (previous: Uint8Array, batch: Json): Uint8Array =>
  chainNextHash(previous, sha256(canonicalBytes(batch)));

/** The same link where only the SHA-256 of the canonical batch is at hand. */
export const chainNextHash = (previous: Uint8Array, batchHash: Uint8Array): Uint8Array => {
  if (previous.length !== 32 || batchHash.length !== 32) {
    throw new RangeError('A chain links hashes of 32 bytes.');
  }
  return sha256(concat(TAG, LINK, previous, batchHash));
};

/** The head after every batch in order; strikes and moves are batches like any other. */
export const chainHead = (inspectionId: string, batches: readonly Json[]): Uint8Array =>
  batches.reduce<Uint8Array>(chainNext, chainStart(inspectionId));
