import { inflateRawSync } from 'node:zlib';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { findZipEntries, type ZipEntry } from './zip-directory';

const MOST_ENTRIES = 200;
const MOST_UNPACKED = 20_000_000;

const WORDS = {
  damaged: 'This XLSX file is damaged. Save the sheet once more, or save it as CSV.',
  large: `Unpacked, this XLSX file holds more than ${MOST_UNPACKED / 1_000_000} MB; a measurement sheet has far less. Save only the sheet itself, or save it as CSV.`,
} as const;

/** Unpacks one entry, never beyond `most` bytes, whatever its directory says; nothing where it is unsound. */
const sizeOf = (bytes: Uint8Array, entry: ZipEntry, most: number): number | undefined => {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (entry.offset + 30 > bytes.length) return undefined;
  const names = view.getUint16(entry.offset + 26, true) + view.getUint16(entry.offset + 28, true);
  const start = entry.offset + 30 + names;
  const packed = bytes.subarray(start, start + entry.packed);
  if (entry.method === 0) return packed.length;
  if (entry.method !== 8) return undefined;
  try {
    return inflateRawSync(packed, { maxOutputLength: most + 1 }).length;
  } catch (error) {
    const tooLong =
      error instanceof RangeError || (error as { code?: string }).code === 'ERR_BUFFER_TOO_LARGE';
    return tooLong ? most + 1 : undefined;
  }
};

/**
 * Refuses a packed file that would unfold too far: first by what its directory says, then by unpacking
 * each entry within a bound, since a directory may lie.
 */
export const refuseBomb = (bytes: Uint8Array): Result<readonly string[], Failure> => {
  const entries = findZipEntries(bytes);
  if (entries === undefined) return fail(failure('damaged-file', WORDS.damaged));
  const stated = entries.reduce((sum, entry) => sum + entry.unpacked, 0);
  if (entries.length > MOST_ENTRIES || stated > MOST_UNPACKED)
    return fail(failure('too-large', WORDS.large));
  let total = 0;
  for (const entry of entries) {
    const size = sizeOf(bytes, entry, MOST_UNPACKED - total);
    if (size === undefined) return fail(failure('damaged-file', WORDS.damaged));
    total += size;
    if (total > MOST_UNPACKED) return fail(failure('too-large', WORDS.large));
  }
  return ok(entries.map((entry) => entry.name));
};
