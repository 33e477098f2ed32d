import { concat, sha256, utf8 } from '../ledger/bytes';
import { canonicalBytes } from '../ledger/canonical';
import type { DrawCommitment } from './documents';

const SECRET_TAG = concat(utf8('tagwire/draw-secret/1'), Uint8Array.of(0));
const SEED_TAG = concat(utf8('tagwire/draw-seed/1'), Uint8Array.of(0));

export const SECRET_LENGTH = 32;

/** SHA-256("tagwire/draw-secret/1" ‖ 0x00 ‖ secret), what is published before the session. */
export const secretHash = (secret: Uint8Array): Uint8Array => {
  if (secret.length !== SECRET_LENGTH) throw new RangeError('A secret has 32 bytes.');
  return sha256(concat(SECRET_TAG, secret));
};

/** SHA-256 of the canonical commitment document. */
export const commitmentHash = (commitment: DrawCommitment): Uint8Array =>
  sha256(canonicalBytes(commitment));

/**
 * SHA-256("tagwire/draw-seed/1" ‖ 0x00 ‖ commitment hash ‖ secret ‖ UTF-8 of the values' text).
 * The commitment in it keeps two draws on the same values apart.
 */
export const seedOf = (commitment: Uint8Array, secret: Uint8Array, values: string): Uint8Array => {
  if (commitment.length !== 32 || secret.length !== SECRET_LENGTH) {
    throw new RangeError('Commitment and secret have 32 bytes each.');
  }
  return sha256(concat(SEED_TAG, commitment, secret, utf8(values)));
};
