export type FilePurpose = 'photograph' | 'sheet';

export const MOST_BYTES: Readonly<Record<FilePurpose, number>> = {
  photograph: 25_000_000,
  sheet: 2_000_000,
};

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
