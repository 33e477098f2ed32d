import { deflateRawSync, deflateSync } from 'node:zlib';
import type { FilePurpose } from '@/domain/paperwork/file/limits';
import { packed } from './packed';
import { packedObjects, pdf } from './pdf';
import { gif, heicClaiming, heicFixture, movingWebp, noise, tiff } from './pictures';
import { chunk, png } from './png';

/** A file that somebody might send by mistake or by intent. */
export interface HostileFile {
  readonly name: string;
  readonly purpose: FilePurpose;
  readonly bytes: Uint8Array;
  /** Words with which it is refused; `kept` where it may stay, being harmless as it is served. */
  readonly says: RegExp | 'kept';
}

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
      Buffer.concat([jpeg, packed([{ name: 'a', packed: deflateRawSync(text('a')), stated: 1 }])]),
      'kept',
    ),
    sheet(
      'unfolds.xlsx',
      packed([{ name: 'xl/workbook.xml', packed: zeros, stated: 60_000_000 }]),
      UNFOLDS,
    ),
    sheet(
      'lies-about-unfolding.xlsx',
      packed([{ name: 'xl/workbook.xml', packed: zeros, stated: 1_000 }]),
      UNFOLDS,
    ),
    sheet(
      'no-sheet.xlsx',
      packed([{ name: 'a.txt', packed: deflateRawSync(text('a')), stated: 1 }]),
      /no XLSX sheet/,
    ),
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
