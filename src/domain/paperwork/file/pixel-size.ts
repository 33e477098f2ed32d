import { heicPixels } from './heic-size';
import type { SniffedKind } from './sniff';

const at16 = (bytes: Uint8Array, at: number): number =>
  (bytes[at] ?? 0) * 256 + (bytes[at + 1] ?? 0);
const at32 = (bytes: Uint8Array, at: number): number =>
  at16(bytes, at) * 65_536 + at16(bytes, at + 2);
const at16Little = (bytes: Uint8Array, at: number): number =>
  (bytes[at] ?? 0) + (bytes[at + 1] ?? 0) * 256;
const at24Little = (bytes: Uint8Array, at: number): number =>
  at16Little(bytes, at) + (bytes[at + 2] ?? 0) * 65_536;

/** From the first frame header of a JPEG (ITU-T T.81, annex B.2.2). */
const jpegPixels = (bytes: Uint8Array): number | undefined => {
  let at = 2;
  while (at + 9 < bytes.length && bytes[at] === 0xff) {
    const marker = bytes[at + 1] ?? 0;
    const isFrame =
      marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc;
    if (isFrame) return at16(bytes, at + 5) * at16(bytes, at + 7);
    at += 2 + at16(bytes, at + 2);
  }
  return undefined;
};

/** From the first chunk: extended, lossless or lossy (RFC 9649, sections 2.5 to 2.7). */
const webpPixels = (bytes: Uint8Array): number | undefined => {
  const chunk = String.fromCharCode(...bytes.subarray(12, 16));
  if (chunk === 'VP8X') return (at24Little(bytes, 24) + 1) * (at24Little(bytes, 27) + 1);
  if (chunk === 'VP8 ') return (at16Little(bytes, 26) & 0x3fff) * (at16Little(bytes, 28) & 0x3fff);
  if (chunk !== 'VP8L') return undefined;
  const low = at16Little(bytes, 21);
  const high = at16Little(bytes, 23);
  return ((low & 0x3fff) + 1) * (((high & 0x0fff) << 2) + (low >>> 14) + 1);
};

/**
 * Pixels that a picture says it has, read from its header without decoding anything; nothing where it
 * does not say. PNG: the IHDR chunk (ISO/IEC 15948, 11.2.2).
 */
export const findPixels = (bytes: Uint8Array, kind: SniffedKind): number | undefined => {
  if (kind === 'png') return at32(bytes, 16) * at32(bytes, 20);
  if (kind === 'heic') return heicPixels(bytes);
  if (kind === 'webp') return webpPixels(bytes);
  return kind === 'jpeg' ? jpegPixels(bytes) : undefined;
};
