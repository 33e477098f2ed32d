import { toHex } from '@/domain/ledger/bytes';
import { KeptFile } from '@/entities/paperwork/file';
import type { Ports } from '../ports';

export const PREVIEW_WIDTHS = [160, 640, 1600] as const;
export const MOST_PHOTOGRAPH_BYTES = 25_000_000;

/** Smaller pictures of a kept photograph, without position data or any other metadata. */
export const makePreviews = async (
  deps: Pick<Ports, 'db' | 'objects' | 'images'>,
  { seriesId, fileId }: { readonly seriesId: string; readonly fileId: string },
): Promise<void> => {
  const file = await deps.db.findOneOrFail(KeptFile, { seriesId, id: fileId });
  const { objectKey, sha256 } = file;
  if (file.previews || !objectKey || !sha256) return;
  const original = await deps.objects.read(objectKey, MOST_PHOTOGRAPH_BYTES);
  const made = await deps.images.previews(original, PREVIEW_WIDTHS);
  const previews: Record<string, string> = {};
  for (const [at, width] of PREVIEW_WIDTHS.entries()) {
    const preview = made[at];
    if (preview === undefined) throw new Error(`No preview of ${width} pixels was made.`);
    const key = `previews/${toHex(new Uint8Array(sha256))}/${width}.jpg`;
    await deps.objects.write(key, preview.bytes, 'image/jpeg');
    previews[width] = key;
  }
  file.previews = previews;
  await deps.db.flush();
};
