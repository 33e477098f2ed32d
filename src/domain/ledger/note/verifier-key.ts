import { ed25519 } from '@noble/curves/ed25519.js';
import { type Failure, failure } from '../../failure';
import { fail, ok, type Result } from '../../result';
import { concat, findBase64, sha256, toBase64, toHex, utf8 } from '../bytes';

const ED25519 = Uint8Array.of(1);
const NEWLINE = Uint8Array.of(10);

/** A public key as C2SP signed-note names it. */
export interface VerifierKey {
  readonly name: string;
  /** Eight hex digits: the first four bytes of SHA-256(name ‖ 0x0A ‖ 0x01 ‖ public key). */
  readonly id: string;
  readonly publicKey: Uint8Array;
}

/** No white space, no plus, no control character; not empty. */
export const isKeyName = (name: string): boolean => /^[^\s+\p{Cc}\p{Surrogate}]+$/u.test(name);

export const verifierKey = (name: string, publicKey: Uint8Array): VerifierKey => {
  if (!isKeyName(name)) throw new RangeError('A key name has no space and no plus.');
  if (publicKey.length !== 32) throw new RangeError('An Ed25519 public key has 32 bytes.');
  const id = sha256(concat(utf8(name), NEWLINE, ED25519, publicKey)).slice(0, 4);
  return { name, id: toHex(id), publicKey };
};

/** `name+id+base64(0x01 ‖ public key)`, the text in which a key is published. */
export const formatVerifierKey = (key: VerifierKey): string =>
  `${key.name}+${key.id}+${toBase64(concat(ED25519, key.publicKey))}`;

export const parseVerifierKey = (text: string): Result<VerifierKey, Failure> => {
  const [, name = '', id = '', encoded = ''] = /^([^+]+)\+([0-9a-f]{8})\+(.+)$/u.exec(text) ?? [];
  const bytes = findBase64(encoded);
  if (bytes?.length === 33 && bytes[0] === 1 && isKeyName(name)) {
    const key = verifierKey(name, bytes.slice(1));
    if (key.id === id) return ok(key);
  }
  return fail(failure('damaged-file', 'This is not an Ed25519 verifier key in C2SP form.'));
};

/** RFC 8032 Ed25519, strict about encodings. A malformed key or signature is a false one. */
export const verifySignature = (
  key: VerifierKey,
  message: Uint8Array,
  signature: Uint8Array,
): boolean => {
  try {
    return ed25519.verify(signature, message, key.publicKey, { zip215: false });
  } catch {
    return false;
  }
};
