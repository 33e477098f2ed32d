import { deflateSync } from 'node:zlib';

const crc = (bytes: Uint8Array): number => {
  let value = 0xffffffff;
  for (const byte of bytes) {
    value ^= byte;
    for (let bit = 0; bit < 8; bit += 1)
      value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  }
  return (value ^ 0xffffffff) >>> 0;
};

/** A chunk of a PNG (ISO/IEC 15948, 5.3). */
export const chunk = (type: string, body: Uint8Array): Buffer => {
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
