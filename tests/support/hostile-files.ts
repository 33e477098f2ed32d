import { readFileSync } from 'node:fs';
import { deflateRawSync, deflateSync } from 'node:zlib';
import sharp from 'sharp';
import type { FilePurpose } from '@/domain/paperwork/file/limits';

/** A file that somebody might send by mistake or by intent. */
export interface HostileFile {
  readonly name: string;
  readonly purpose: FilePurpose;
  readonly bytes: Uint8Array;
  /** Words with which it is refused; `kept` where it may stay, being harmless as it is served. */
  readonly says: RegExp | 'kept';
}

/** A HEIC picture made by `fixtures/make-heic.mjs`. */
export const heicFixture = (name: string): Buffer =>
  readFileSync(new URL(`../services/file/fixtures/${name}.heic`, import.meta.url));

const crc = (bytes: Uint8Array): number => {
  let value = 0xffffffff;
  for (const byte of bytes) {
    value ^= byte;
    for (let bit = 0; bit < 8; bit += 1)
      value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  }
  return (value ^ 0xffffffff) >>> 0;
};

const chunk = (type: string, body: Uint8Array): Buffer => {
  const typed = Buffer.concat([Buffer.from(type), body]);
  const out = Buffer.alloc(typed.length + 8);
  out.writeUInt32BE(body.length, 0);
  typed.copy(out, 4);
  out.writeUInt32BE(crc(typed), typed.length + 4);
  return out;
};

interface PngShape {
  readonly side: number;
  readonly depth: 1 | 8 | 16;
  /** 0 grey, 6 red, green, blue and transparency. */
  readonly colour: 0 | 6;
  readonly interlaced?: boolean;
  readonly extra?: readonly Buffer[];
}

/** A picture of one colour: few bytes packed, as many unfolded as its shape says. */
export const png = ({ side, depth, colour, interlaced = false, extra = [] }: PngShape): Buffer => {
  const head = Buffer.alloc(13);
  head.writeUInt32BE(side, 0);
  head.writeUInt32BE(side, 4);
  head.writeUInt8(depth, 8);
  head.writeUInt8(colour, 9);
  head.writeUInt8(interlaced ? 1 : 0, 12);
  const row = (pixels: number) => 1 + Math.ceil((pixels * depth * (colour === 6 ? 4 : 1)) / 8);
  // Adam7: columns and rows of the seven passes (ISO/IEC 15948, 8.2).
  const passes = interlaced
    ? [
        [8, 8],
        [8, 8],
        [4, 8],
        [4, 4],
        [2, 4],
        [2, 2],
        [1, 2],
      ]
    : [[1, 1]];
  const size = passes.reduce(
    (sum, [x = 1, y = 1]) => sum + row(Math.ceil(side / x)) * Math.ceil(side / y),
    0,
  );
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', head),
    ...extra,
    chunk('IDAT', deflateSync(Buffer.alloc(size))),
    chunk('IEND', new Uint8Array()),
  ]);
};

const noise = (side: number) =>
  sharp({
    create: {
      width: side,
      height: side,
      channels: 3,
      background: '#777',
      noise: { type: 'gaussian', mean: 120, sigma: 40 },
    },
  });

/** A GIF of one pixel, shown as often as asked (GIF89a). */
const gif = (frames: number): Buffer => {
  const frame = Buffer.from(
    '21f9040000000000002c00000000010001000002024401 00'.replace(' ', ''),
    'hex',
  );
  return Buffer.concat([
    Buffer.from('GIF89a'),
    Buffer.from('01000100800000000000ffffff', 'hex'),
    ...Array.from({ length: frames }, () => frame),
    Buffer.from([0x3b]),
  ]);
};

/** TIFF 6.0, one strip: says 60,000 × 60,000 pixels. */
const tiff = (): Buffer => {
  const tags = [
    [256, 60_000],
    [257, 60_000],
    [258, 8],
    [259, 1],
    [262, 1],
    [273, 8],
    [278, 60_000],
    [279, 16],
  ] as const;
  const out = Buffer.alloc(26 + tags.length * 12 + 16);
  out.write('II*\0', 0, 'latin1');
  out.writeUInt32LE(24, 4);
  out.writeUInt16LE(tags.length, 24);
  for (const [at, [tag, value]] of tags.entries()) {
    out.writeUInt16LE(tag, 26 + at * 12);
    out.writeUInt16LE(4, 28 + at * 12);
    out.writeUInt32LE(1, 30 + at * 12);
    out.writeUInt32LE(value, 34 + at * 12);
  }
  return out;
};

/** A moving WebP that repeats one frame (RFC 9649, section 2.7). */
const movingWebp = async (frames: number, canvas: number): Promise<Buffer> => {
  const still = await sharp({ create: { width: 8, height: 8, channels: 3, background: '#333' } })
    .webp({ lossless: true })
    .toBuffer();
  const riff = (name: string, body: Buffer) => {
    const head = Buffer.alloc(8);
    head.write(name, 0, 'latin1');
    head.writeUInt32LE(body.length, 4);
    return Buffer.concat([head, body, Buffer.alloc(body.length % 2)]);
  };
  const extended = Buffer.alloc(10);
  extended.writeUInt8(2, 0);
  extended.writeUIntLE(canvas - 1, 4, 3);
  extended.writeUIntLE(canvas - 1, 7, 3);
  const place = Buffer.alloc(16);
  place.writeUIntLE(7, 6, 3);
  place.writeUIntLE(7, 9, 3);
  const frame = riff('ANMF', Buffer.concat([place, still.subarray(12)]));
  return riff(
    'RIFF',
    Buffer.concat([
      Buffer.from('WEBP'),
      riff('VP8X', extended),
      riff('ANIM', Buffer.alloc(6)),
      ...Array.from({ length: frames }, () => frame),
    ]),
  );
};

/** The fixture with every stated size of a picture changed; the picture itself stays as it is. */
const heicClaiming = (fixture: string, width: number, height: number): Buffer => {
  const bytes = heicFixture(fixture);
  for (let at = bytes.indexOf('ispe'); at > 0; at = bytes.indexOf('ispe', at + 4)) {
    bytes.writeUInt32BE(width, at + 8);
    bytes.writeUInt32BE(height, at + 12);
  }
  return bytes;
};

const zip = (name: string, packed: Uint8Array, stated: number): Buffer => {
  const local = Buffer.alloc(30);
  local.writeUInt32LE(0x04034b50, 0);
  local.writeUInt16LE(8, 8);
  local.writeUInt32LE(packed.length, 18);
  local.writeUInt32LE(stated, 22);
  local.writeUInt16LE(name.length, 26);
  const entry = Buffer.alloc(46);
  entry.writeUInt32LE(0x02014b50, 0);
  entry.writeUInt16LE(8, 10);
  entry.writeUInt32LE(packed.length, 20);
  entry.writeUInt32LE(stated, 24);
  entry.writeUInt16LE(name.length, 28);
  const body = Buffer.concat([local, Buffer.from(name), packed]);
  const directory = Buffer.concat([entry, Buffer.from(name)]);
  const end = Buffer.alloc(22);
  end.writeUInt32LE(0x06054b50, 0);
  end.writeUInt16LE(1, 8);
  end.writeUInt16LE(1, 10);
  end.writeUInt32LE(directory.length, 12);
  end.writeUInt32LE(body.length, 16);
  return Buffer.concat([body, directory, end]);
};

const pdf = (...objects: readonly (string | Buffer)[]): Buffer =>
  Buffer.concat([
    Buffer.from('%PDF-1.7\n'),
    ...objects.map((one, at) =>
      Buffer.concat([
        Buffer.from(`${at + 1} 0 obj\n`),
        typeof one === 'string' ? Buffer.from(one, 'latin1') : one,
        Buffer.from('\nendobj\n'),
      ]),
    ),
    Buffer.from('trailer\n<< /Root 1 0 R >>\nstartxref\n0\n%%EOF\n'),
  ]);

const packedObjects = (content: Uint8Array, filter = '/FlateDecode'): Buffer =>
  Buffer.concat([
    Buffer.from(`<< /Type /ObjStm /N 1 /First 4 /Filter ${filter} >>\nstream\n`),
    deflateSync(content),
    Buffer.from('\nendstream'),
  ]);

const CATALOGUE = '<< /Type /Catalog /Pages 2 0 R >>';
const SCRIPT = '<< /Type /Catalog /OpenAction << /S /JavaScript /JS (app.alert(1)) >> >>';
const TOO_MANY = /^This picture has [\d,]+ million pixels; at most 50 million are taken\./;
const CUT = /is damaged or was cut short on its way\. Take or send it again\.$/;
const HEIC_UNREAD = /share the photograph as JPEG, then add it again\.$/;
const MARKUP =
  /^By its content this is a web page or drawing \(HTML, SVG\), whatever its name says\./;
const ACTIVE_PDF = /^This PDF document carries a program/;
const UNFOLDS = /^Unpacked, this XLSX file holds more than 20 MB/;

const half = (bytes: Uint8Array) => bytes.subarray(0, Math.floor(bytes.length / 2));

/** The corpus, made anew at every run. */
export const hostileFiles = async (): Promise<readonly HostileFile[]> => {
  const jpeg = await noise(800).jpeg().toBuffer();
  const heic = heicFixture('rack');
  const claimed = Buffer.from(jpeg);
  const frame = claimed.indexOf(Buffer.from([0xff, 0xc0]));
  claimed.writeUInt16BE(60_000, frame + 5);
  claimed.writeUInt16BE(60_000, frame + 7);
  const photograph = (name: string, bytes: Uint8Array, says: HostileFile['says']) =>
    ({ name, purpose: 'photograph', bytes, says }) as const;
  const sheet = (name: string, bytes: Uint8Array, says: HostileFile['says']) =>
    ({ name, purpose: 'sheet', bytes, says }) as const;
  const text = (content: string) => Buffer.from(content, 'utf8');
  const zeros = deflateRawSync(Buffer.alloc(60_000_000));
  return [
    photograph('zero-bytes.jpg', new Uint8Array(), /^The file is empty\.$/),
    photograph('400-megapixels.png', png({ side: 20_000, depth: 1, colour: 0 }), TOO_MANY),
    photograph('claims-3600-megapixels.jpg', claimed, TOO_MANY),
    photograph('moving-268-megapixels.webp', await movingWebp(1, 16_383), TOO_MANY),
    photograph('claims-900-megapixels.heic', heicClaiming('rack', 30_000, 30_000), TOO_MANY),
    photograph('claims-less-than-it-holds.heic', heicClaiming('rack', 64, 64), HEIC_UNREAD),
    photograph(
      'claims-64-pixels-holds-48-million.heic',
      heicClaiming('48-megapixels', 64, 64),
      HEIC_UNREAD,
    ),
    photograph('64-megapixels.heic', heicFixture('64-megapixels'), TOO_MANY),
    photograph('48-megapixels.heic', heicFixture('48-megapixels'), 'kept'),
    photograph('cut.heic', half(heic), HEIC_UNREAD),
    photograph('head-only.heic', heic.subarray(0, 40), HEIC_UNREAD),
    photograph('cut.jpg', half(jpeg), CUT),
    photograph('cut.png', half(await noise(400).png().toBuffer()), CUT),
    photograph('cut.webp', half(await noise(400).webp().toBuffer()), CUT),
    photograph(
      'svg.jpg',
      text('<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>'),
      MARKUP,
    ),
    photograph('svg-after-a-comment.png', text('\ufeff<!-- a --><svg/>'), MARKUP),
    photograph('html.png', text(' <!doctype html><script>alert(1)</script>'), MARKUP),
    photograph('ten-thousand-frames.gif', gif(10_000), /^By its content this is a GIF picture/),
    photograph('gif-and-script.jpg', text('GIF89a=1;alert(1)//'), /^By its content this is a GIF/),
    photograph('3600-megapixels.tiff', tiff(), /^By its content this is a TIFF picture/),
    photograph('avif.jpg', await noise(64).avif().toBuffer(), /^By its content this is an AVIF/),
    photograph('film.jpg', text('\0\0\0\u0018ftypmp42\0\0\0\0'), /^By its content this is a video/),
    photograph('pdf.jpg', pdf(CATALOGUE), /^By its content this is a PDF document/),
    photograph('program.jpg', text('MZ\0 no picture'), /^By its content this is no picture/),
    // What may stay: big only within the budget, or with a tail that nothing ever runs.
    photograph('49-megapixels-deep.png', png({ side: 7_000, depth: 16, colour: 6 }), 'kept'),
    photograph(
      '25-megapixels-interlaced.png',
      png({ side: 5_000, depth: 8, colour: 6, interlaced: true }),
      'kept',
    ),
    photograph(
      'packed-words.png',
      png({
        side: 64,
        depth: 8,
        colour: 6,
        extra: [
          chunk('zTXt', Buffer.concat([text('a\0\0'), deflateSync(Buffer.alloc(300_000_000))])),
        ],
      }),
      'kept',
    ),
    photograph(
      '49-megapixels-in-steps.jpg',
      await noise(7_000).jpeg({ progressive: true }).toBuffer(),
      'kept',
    ),
    photograph('ten-thousand-frames.webp', await movingWebp(10_000, 8), 'kept'),
    photograph(
      'jpeg-then-html.html',
      Buffer.concat([jpeg, text('<script>alert(1)</script>')]),
      'kept',
    ),
    photograph(
      'jpeg-then-zip.jpg',
      Buffer.concat([jpeg, zip('a', deflateRawSync(text('a')), 1)]),
      'kept',
    ),
    sheet('unfolds.xlsx', zip('xl/workbook.xml', zeros, 60_000_000), UNFOLDS),
    sheet('lies-about-unfolding.xlsx', zip('xl/workbook.xml', zeros, 1_000), UNFOLDS),
    sheet('no-sheet.xlsx', zip('a.txt', deflateRawSync(text('a')), 1), /no XLSX sheet/),
    sheet(
      'html.csv',
      text('<html><script>alert(1)</script>'),
      /^By its content this is a web page/,
    ),
    sheet('script.pdf', pdf(SCRIPT), ACTIVE_PDF),
    sheet(
      'script-spelt-otherwise.pdf',
      pdf(SCRIPT.replace('/JavaScript', '/J#61vaScript').replace('/JS', '/#4a#53')),
      ACTIVE_PDF,
    ),
    sheet('script-packed.pdf', pdf(CATALOGUE, packedObjects(text(`1 0 ${SCRIPT}`))), ACTIVE_PDF),
    sheet('starts-a-program.pdf', pdf('<< /OpenAction << /S /Launch /F (a.exe) >> >>'), ACTIVE_PDF),
    sheet('carries-a-file.pdf', pdf('<< /Names << /EmbeddedFiles 3 0 R >> >>'), ACTIVE_PDF),
    sheet(
      'unfolds.pdf',
      pdf(CATALOGUE, packedObjects(Buffer.alloc(400_000_000))),
      /cannot be looked into/,
    ),
    sheet(
      'packed-twice.pdf',
      pdf(CATALOGUE, packedObjects(text('a'), '[/ASCIIHexDecode /FlateDecode]')),
      /cannot be looked into/,
    ),
    sheet('locked.pdf', pdf('<< /Encrypt 3 0 R >>'), /^This PDF document is locked/),
    sheet(
      'cut.pdf',
      half(pdf(CATALOGUE, packedObjects(Buffer.alloc(20_000, 'x')))),
      /^This PDF document is damaged/,
    ),
    sheet('picture.csv', jpeg, /^This is a picture\./),
    sheet(
      'plain.pdf',
      pdf(CATALOGUE, '<< /Type /Pages /OpenAction [3 0 R /XYZ null null 0] >>'),
      'kept',
    ),
  ];
};
