import { inflateRawSync } from 'node:zlib';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { readText } from '../read-text';
import { MOST_SPENT, type Spent } from '../spent';
import { findPacked, findZipEntries, type ZipEntry } from './zip-directory';

const MOST_ENTRIES = 200;

const WORDS = {
  damaged: 'This XLSX file is damaged. Save the sheet once more, or save it as CSV.',
  large: `Unpacked, this XLSX file holds more than ${MOST_SPENT.unpackedBytes / 1_000_000} MB; a measurement sheet has far less. Save only the sheet itself, or save it as CSV.`,
  many: `This packed file holds more than ${MOST_ENTRIES} parts; a measurement sheet has some ten. Save only the sheet itself, or save it as CSV.`,
  locked: 'This file is locked with a password. Save it without one and add it again.',
  macros:
    'This workbook holds macros. Save it as “XLSX” without them, or as CSV, and add it again.',
  other: 'This packed file is no XLSX sheet. Save the sheet as XLSX or CSV and add it again.',
} as const;

export const damagedXlsx = () => fail(failure('damaged-file', WORDS.damaged));

/** A packed file whose directory was looked through; its parts are unpacked one by one, within the bounds. */
export interface Package {
  readonly bytes: Uint8Array;
  readonly entries: readonly ZipEntry[];
  /** The text of a part; empty where there is no such part. */
  readonly read: (name: string) => Result<string, Failure>;
}

/** Unpacks one entry, never beyond the bound, whatever its directory says. */
const unpack = (bytes: Uint8Array, entry: ZipEntry, spent: Spent): Result<Uint8Array, Failure> => {
  const packed = findPacked(bytes, entry);
  if (packed === undefined) return damagedXlsx();
  const most = MOST_SPENT.unpackedBytes - spent.unpackedBytes;
  const tooLarge = () => {
    spent.unpackedBytes = MOST_SPENT.unpackedBytes;
    return fail(failure('too-large', WORDS.large));
  };
  if (entry.method !== 0 && entry.method !== 8) return damagedXlsx();
  if (entry.method === 0) {
    if (packed.length > most) return tooLarge();
    spent.unpackedBytes += packed.length;
    return ok(packed);
  }
  try {
    const unpacked = inflateRawSync(packed, { maxOutputLength: Math.max(1, most) });
    spent.unpackedBytes += unpacked.length;
    return ok(unpacked);
  } catch (error) {
    const long =
      error instanceof RangeError || (error as { code?: string }).code === 'ERR_BUFFER_TOO_LARGE';
    return long ? tooLarge() : damagedXlsx();
  }
};

const isMacro = ({ name }: ZipEntry): boolean => /vbaProject\.bin$|\/macrosheets\//i.test(name);

/**
 * Looks at what a packed file says of itself before anything is unpacked. Only parts that its directory
 * lists are ever read: what else lies between them stays where it is.
 */
export const openPackage = (bytes: Uint8Array, spent: Spent): Result<Package, Failure> => {
  const entries = findZipEntries(bytes);
  if (entries === undefined) return damagedXlsx();
  if (entries.length > MOST_ENTRIES) return fail(failure('too-large', WORDS.many));
  const stated = entries.reduce((sum, entry) => sum + entry.unpacked, 0);
  if (stated > MOST_SPENT.unpackedBytes) return fail(failure('too-large', WORDS.large));
  if (entries.some((entry) => entry.encrypted))
    return fail(failure('unsupported-file', WORDS.locked));
  if (entries.some(isMacro)) return fail(failure('unsupported-file', WORDS.macros));
  const names = new Set(entries.map(({ name }) => name));
  if (!names.has('xl/workbook.xml')) return fail(failure('unsupported-file', WORDS.other));
  // Two parts of one name: which of them a program reads is its own choice.
  if (names.size !== entries.length) return damagedXlsx();
  return ok({
    bytes,
    entries,
    read: (name) => {
      const entry = entries.find((one) => one.name === name);
      if (entry === undefined) return ok('');
      const part = unpack(bytes, entry, spent);
      return part.ok ? ok(readText(part.value)) : part;
    },
  });
};
