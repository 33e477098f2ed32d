import { concat, sameBytes, sha256, utf8 } from './bytes';

const TAG = concat(utf8('tagwire/commitment/1'), Uint8Array.of(0));

export const SALT_LENGTH = 32;

/**
 * SHA-256("tagwire/commitment/1" ‖ 0x00 ‖ salt ‖ SHA-256(content)).
 * The salt is 32 random bytes of its own for each commitment. Once content and salt are deleted,
 * the commitment tells nothing about them.
 */
export const commit = (salt: Uint8Array, content: Uint8Array): Uint8Array =>
  commitHash(salt, sha256(content));

/** The same, where only the content's SHA-256 is at hand. */
export const commitHash = (salt: Uint8Array, contentHash: Uint8Array): Uint8Array => {
  if (salt.length !== SALT_LENGTH) throw new RangeError('A salt has 32 bytes.');
  if (contentHash.length !== 32) throw new RangeError('A SHA-256 has 32 bytes.');
  return sha256(concat(TAG, salt, contentHash));
};

export const opens = (commitment: Uint8Array, salt: Uint8Array, contentHash: Uint8Array): boolean =>
  salt.length === SALT_LENGTH &&
  contentHash.length === 32 &&
  sameBytes(commitHash(salt, contentHash), commitment);
