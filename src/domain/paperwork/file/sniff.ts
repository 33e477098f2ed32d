/** What a file is by its first bytes, whatever its name says. */
export type SniffedKind =
  | 'jpeg'
  | 'png'
  | 'webp'
  | 'heic'
  | 'avif'
  | 'video'
  | 'gif'
  | 'tiff'
  | 'pdf'
  | 'zip'
  | 'markup'
  | 'other';

const ascii = (bytes: Uint8Array, from: number, to: number): string =>
  String.fromCharCode(...bytes.subarray(from, to));

const starts = (bytes: Uint8Array, ...magic: readonly number[]): boolean =>
  magic.every((byte, at) => bytes[at] === byte);

const HEIC = new Set(['heic', 'heix', 'hevc', 'hevx', 'mif1', 'msf1', 'heim', 'heis']);

export const sniff = (bytes: Uint8Array): SniffedKind => {
  if (starts(bytes, 0xff, 0xd8, 0xff)) return 'jpeg';
  if (starts(bytes, 0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)) return 'png';
  if (ascii(bytes, 0, 4) === 'RIFF' && ascii(bytes, 8, 12) === 'WEBP') return 'webp';
  if (ascii(bytes, 4, 8) === 'ftyp' && HEIC.has(ascii(bytes, 8, 12))) return 'heic';
  if (ascii(bytes, 4, 8) === 'ftyp') return ascii(bytes, 8, 11) === 'avi' ? 'avif' : 'video';
  if (ascii(bytes, 0, 4) === 'GIF8') return 'gif';
  if (starts(bytes, 0x49, 0x49, 0x2a, 0) || starts(bytes, 0x4d, 0x4d, 0, 0x2a)) return 'tiff';
  if (ascii(bytes, 0, 5) === '%PDF-') return 'pdf';
  if (starts(bytes, 0x50, 0x4b, 3, 4) || starts(bytes, 0x50, 0x4b, 5, 6)) return 'zip';
  // Before the first tag may stand spaces or a byte-order mark.
  return /^[\s\u00ef\u00bb\u00bf]*<(!|\?xml|svg|html|head|body|script)/i.test(ascii(bytes, 0, 200))
    ? 'markup'
    : 'other';
};

export const KIND_WORDS: Readonly<Record<SniffedKind, string>> = {
  jpeg: 'a JPEG picture',
  png: 'a PNG picture',
  webp: 'a WebP picture',
  heic: 'a HEIC picture',
  avif: 'an AVIF picture',
  video: 'a video',
  gif: 'a GIF picture',
  tiff: 'a TIFF picture',
  pdf: 'a PDF document',
  zip: 'a packed file',
  markup: 'a web page or drawing (HTML, SVG)',
  other: 'no picture',
};
