import { fileTypeFromBuffer } from 'file-type';
import sharp from 'sharp';
import type { ImageFacts, Images } from '@/services/ports';

const MOST_PIXELS = 50_000_000;
const TYPES = new Set<string>(['image/jpeg', 'image/png', 'image/webp']);

sharp.cache(false);
sharp.concurrency(1);

const open = (bytes: Uint8Array) =>
  sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: 'error', animated: false });

/** sharp decodes far more than photographs: the allow-list comes first, by content. */
const findType = async (bytes: Uint8Array): Promise<ImageFacts['type'] | undefined> => {
  const type = await fileTypeFromBuffer(bytes);
  return type !== undefined && TYPES.has(type.mime) ? (type.mime as ImageFacts['type']) : undefined;
};

export const images: Images = {
  findFacts: async (bytes) => {
    const type = await findType(bytes);
    if (type === undefined) return undefined;
    try {
      // Decoding the whole picture is what shows a truncated one.
      const { info } = await open(bytes).autoOrient().raw().toBuffer({ resolveWithObject: true });
      return { type, width: info.width, height: info.height };
    } catch {
      return undefined;
    }
  },
  previews: async (bytes, widths) => {
    if ((await findType(bytes)) === undefined) throw new Error('Not a photograph.');
    const made: { width: number; bytes: Uint8Array }[] = [];
    for (const width of widths) {
      const preview = await open(bytes)
        .autoOrient()
        .resize({ width, withoutEnlargement: true })
        .jpeg({ quality: 82, mozjpeg: false })
        .toBuffer();
      made.push({ width, bytes: preview });
    }
    return made;
  },
};
