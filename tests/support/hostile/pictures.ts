import { readFileSync } from 'node:fs';
import sharp from 'sharp';

/** A HEIC picture made by `fixtures/make-heic.mjs`. */
export const heicFixture = (name: string): Buffer =>
  readFileSync(new URL(`../../services/file/fixtures/${name}.heic`, import.meta.url));

/** A picture in which nothing repeats. */
export const noise = (side: number) =>
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
export const gif = (frames: number): Buffer => {
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
export const tiff = (): Buffer => {
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
export const movingWebp = async (frames: number, canvas: number): Promise<Buffer> => {
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
export const heicClaiming = (fixture: string, width: number, height: number): Buffer => {
  const bytes = heicFixture(fixture);
  for (let at = bytes.indexOf('ispe'); at > 0; at = bytes.indexOf('ispe', at + 4)) {
    bytes.writeUInt32BE(width, at + 8);
    bytes.writeUInt32BE(height, at + 12);
  }
  return bytes;
};
