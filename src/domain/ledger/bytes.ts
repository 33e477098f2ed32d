import { sha256 as digest } from '@noble/hashes/sha2.js';
import { bytesToHex, concatBytes } from '@noble/hashes/utils.js';

export const sha256 = (bytes: Uint8Array): Uint8Array => digest(bytes);

export const concat = (...parts: readonly Uint8Array[]): Uint8Array => concatBytes(...parts);

export const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);

/** Lower case, two digits a byte. */
export const toHex = (bytes: Uint8Array): string => bytesToHex(bytes);

/** Only lower-case hex of exactly `length` bytes is read; anything else gives undefined. */
export const findHex = (text: string, length: number): Uint8Array | undefined => {
  if (text.length !== length * 2 || !/^[0-9a-f]*$/.test(text)) return undefined;
  return Uint8Array.from({ length }, (_, i) => Number.parseInt(text.slice(2 * i, 2 * i + 2), 16));
};

/** RFC 4648 section 4, with padding. */
export const toBase64 = (bytes: Uint8Array): string =>
  btoa(Array.from(bytes, (byte) => String.fromCharCode(byte)).join(''));

/** Strict RFC 4648 section 4: the text must be exactly what encoding the bytes gives. */
export const findBase64 = (text: string): Uint8Array | undefined => {
  if (!/^[A-Za-z0-9+/]+={0,2}$/.test(text) || text.length % 4 !== 0) return undefined;
  const bytes = Uint8Array.from(atob(text), (char) => char.charCodeAt(0));
  return toBase64(bytes) === text ? bytes : undefined;
};

export const sameBytes = (a: Uint8Array, b: Uint8Array): boolean =>
  a.length === b.length && a.every((byte, i) => byte === b[i]);

/** A whole number as `length` bytes, most significant first. */
export const bigEndian = (value: number, length: number): Uint8Array => {
  const bytes = new Uint8Array(length);
  let rest = value;
  for (let i = length - 1; i >= 0; i--) {
    bytes[i] = rest % 256;
    rest = Math.floor(rest / 256);
  }
  return bytes;
};

/**
 * A whole number written in decimal, without sign or leading zeros, small enough to be exact
 * in a double; anything else gives undefined.
 */
export const findWhole = (text: string): number | undefined => {
  if (!/^(0|[1-9]\d{0,15})$/.test(text)) return undefined;
  const value = Number(text);
  return Number.isSafeInteger(value) ? value : undefined;
};
