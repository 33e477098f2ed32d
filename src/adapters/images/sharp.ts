import { fileTypeFromBuffer } from 'file-type';
import sharp, { type Sharp } from 'sharp';
import type { ImageFacts, Images } from '@/services/ports';
import { decodeHeic } from './heic';
import { oneAtATime } from './one-at-a-time';

const MOST_PIXELS = 50_000_000;
const TYPES = new Set<string>(['image/jpeg', 'image/png', 'image/webp']);
// A sequence of pictures (`-sequence`) is read by its main one.
const HEIC = /^image\/hei[cf](-sequence)?$/;

sharp.cache(false);
sharp.concurrency(1);

// Decoded pictures are large: this process holds one at any time.
const inTurn = oneAtATime();

/** `sequentialRead` keeps a few rows at a time instead of the whole picture, where the format allows. */
const open = (bytes: Uint8Array) =>
  sharp(bytes, {
    limitInputPixels: MOST_PIXELS,
    failOn: 'error',
    animated: false,
    sequentialRead: true,
  }).timeout({ seconds: 30 });

/** sharp decodes far more than photographs: the allow-list comes first, by content. */
const findType = async (bytes: Uint8Array): Promise<ImageFacts['type'] | undefined> => {
  const type = (await fileTypeFromBuffer(bytes))?.mime ?? '';
  if (HEIC.test(type)) return 'image/heic';
  return TYPES.has(type) ? (type as ImageFacts['type']) : undefined;
};

const heicFacts = async (bytes: Uint8Array): Promise<ImageFacts | undefined> => {
  const picture = await decodeHeic(bytes, { pixels: MOST_PIXELS, wantsPixels: false });
  return picture && { type: 'image/heic', width: picture.width, height: picture.height };
};

const facts = async (
  bytes: Uint8Array,
  type: Exclude<ImageFacts['type'], 'image/heic'>,
): Promise<ImageFacts> => {
  const { width, height, orientation = 1 } = await open(bytes).metadata();
  // Decoding the whole picture is what shows a truncated one; nothing of it is kept.
  await open(bytes)
    .resize({ width: 8, height: 8, fit: 'fill', fastShrinkOnLoad: false })
    .toBuffer();
  // From 5 on the camera was held sideways (Exif 2.32, 4.6.5).
  return orientation < 5 ? { type, width, height } : { type, width: height, height: width };
};

/** Each width made of the picture; the widest first, the others of it. */
const shrink = async (picture: Sharp, widths: readonly number[]) => {
  const made = new Map<number, Uint8Array>();
  let from = picture;
  for (const width of widths.toSorted((a, b) => b - a)) {
    const { data, info } = await from
      .resize({ width, withoutEnlargement: true })
      .flatten({ background: '#ffffff' })
      .toColourspace('srgb')
      .raw({ depth: 'uchar' })
      .toBuffer({ resolveWithObject: true });
    const raw = { width: info.width, height: info.height, channels: info.channels };
    made.set(width, await sharp(data, { raw }).jpeg({ quality: 82, mozjpeg: false }).toBuffer());
    from = sharp(data, { raw });
  }
  return widths.map((width) => ({ width, bytes: made.get(width) ?? new Uint8Array() }));
};

export const images: Images = {
  findFacts: (bytes) =>
    inTurn(async () => {
      const type = await findType(bytes);
      if (type === undefined) return undefined;
      try {
        return await (type === 'image/heic' ? heicFacts(bytes) : facts(bytes, type));
      } catch {
        return undefined;
      }
    }),
  previews: (bytes, widths) =>
    inTurn(async () => {
      const type = await findType(bytes);
      if (type === undefined) throw new Error('Not a photograph.');
      if (type !== 'image/heic') return shrink(open(bytes).autoOrient(), widths);
      const picture = await decodeHeic(bytes, { pixels: MOST_PIXELS, wantsPixels: true });
      if (picture?.rgb === undefined) throw new Error('The HEIC photograph could not be decoded.');
      const { width, height, rgb } = picture;
      return shrink(sharp(rgb, { raw: { width, height, channels: 3 } }), widths);
    }),
};
