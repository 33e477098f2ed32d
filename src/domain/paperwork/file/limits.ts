export type FilePurpose = 'photograph' | 'sheet';

export const MOST_BYTES: Readonly<Record<FilePurpose, number>> = {
  photograph: 25_000_000,
  sheet: 2_000_000,
};

/** What an object store takes as a part, the last one excepted. */
export const PART_BYTES = 5 * 1024 * 1024;

/** A file up to this size goes in one request; a larger one in parts, so that a lost connection costs one. */
export const MOST_AT_ONCE = 8 * 1024 * 1024;

/** Bytes of each part, in order; empty where the file goes in one request. */
export const partSizes = (bytes: number): readonly number[] =>
  bytes <= MOST_AT_ONCE
    ? []
    : Array.from({ length: Math.ceil(bytes / PART_BYTES) }, (_, at) =>
        Math.min(PART_BYTES, bytes - at * PART_BYTES),
      );

/** In one paperwork, those taken out again not counted. */
export const MOST_FILES = 40;

export const MOST_PIXELS = 50_000_000;

/** `2.4 MB`, `310 kB`. */
export const sizeWords = (bytes: number): string =>
  bytes >= 1_000_000
    ? `${(bytes / 1_000_000).toFixed(1)} MB`
    : `${Math.max(1, Math.round(bytes / 1_000))} kB`;

export const tooLargeWords = (purpose: FilePurpose, bytes: number): string =>
  `This ${purpose} has ${sizeWords(bytes)}; at most ${sizeWords(MOST_BYTES[purpose])} are taken. ${
    purpose === 'photograph'
      ? 'Send it in a smaller size from the phone.'
      : 'Save only the measurement sheet, without pictures.'
  }`;

/** For a HEIC photograph that could not be decoded within the bounds. */
export const HEIC_WORDS =
  'This HEIC photograph could not be read. On the phone choose “Most compatible” for the camera, or share the photograph as JPEG, then add it again.';
