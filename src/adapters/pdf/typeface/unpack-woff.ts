import { inflateSync } from 'node:zlib';

const HEADER = 44;
const ENTRY = 20;
const SFNT_HEADER = 12;
const SFNT_ENTRY = 16;

const aligned = (length: number): number => (length + 3) & ~3;

/**
 * A WOFF file (W3C WOFF 1.0) as the plain font it wraps. The subsetter could read WOFF itself, but
 * inflates it anew for every document and in slow code.
 */
export const unpackWoff = (file: Uint8Array): Uint8Array => {
  const woff = Buffer.from(file);
  if (woff.toString('latin1', 0, 4) !== 'wOFF') throw new Error('This is no WOFF file.');
  const count = woff.readUInt16BE(12);
  const tables = Array.from({ length: count }, (_, i) => {
    const at = HEADER + i * ENTRY;
    const [offset, packed, length] = [4, 8, 12].map((field) => woff.readUInt32BE(at + field));
    const stored = woff.subarray(offset, (offset ?? 0) + (packed ?? 0));
    return {
      tag: woff.subarray(at, at + 4),
      checksum: woff.readUInt32BE(at + 16),
      bytes: packed === length ? stored : inflateSync(stored),
    };
  });
  const size = tables.reduce(
    (sum, { bytes }) => sum + aligned(bytes.length),
    SFNT_HEADER + count * SFNT_ENTRY,
  );
  const font = Buffer.alloc(size);
  woff.copy(font, 0, 4, 8);
  const power = 2 ** Math.floor(Math.log2(count));
  font.writeUInt16BE(count, 4);
  font.writeUInt16BE(power * 16, 6);
  font.writeUInt16BE(Math.log2(power), 8);
  font.writeUInt16BE((count - power) * 16, 10);
  let offset = SFNT_HEADER + count * SFNT_ENTRY;
  for (const [i, { tag, checksum, bytes }] of tables.entries()) {
    const at = SFNT_HEADER + i * SFNT_ENTRY;
    tag.copy(font, at);
    font.writeUInt32BE(checksum, at + 4);
    font.writeUInt32BE(offset, at + 8);
    font.writeUInt32BE(bytes.length, at + 12);
    bytes.copy(font, offset);
    offset += aligned(bytes.length);
  }
  return font;
};
