import { LockMode } from '@mikro-orm/postgresql';
import { toHex } from '@/domain/ledger/bytes';
import { KeptFile } from '@/entities/paperwork/file';
import type { Ports } from '../ports';
import { lockContent } from './content/hold-object';

export const PREVIEW_WIDTHS = [160, 640, 1600] as const;
export const MOST_PHOTOGRAPH_BYTES = 25_000_000;

/**
 * Smaller pictures of a kept photograph, without position data or any other metadata. They are written
 * under the row's lock: an erasure finds either all of them or none, and of erased files none are made.
 */
export const makePreviews = async (
  deps: Pick<Ports, 'db' | 'objects' | 'images'>,
  { seriesId, fileId }: { readonly seriesId: string; readonly fileId: string },
): Promise<void> => {
  const file = await deps.db.findOne(KeptFile, { seriesId, id: fileId });
  if (file === null || file.previews || !file.objectKey || !file.sha256) return;
  const hash = toHex(new Uint8Array(file.sha256));
  const original = await deps.objects.read(file.objectKey, MOST_PHOTOGRAPH_BYTES);
  const made = await deps.images.previews(original, PREVIEW_WIDTHS);
  const previews: Record<string, string> = {};
  await deps.db.fork().transactional(async (em) => {
    const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
    const row = await em.findOne(KeptFile, { seriesId, id: fileId }, lock);
    if (row === null || row.previews) return;
    await lockContent(em, hash);
    for (const [at, width] of PREVIEW_WIDTHS.entries()) {
      const preview = made[at];
      if (preview === undefined) throw new Error(`No preview of ${width} pixels was made.`);
      const key = `previews/${hash}/${width}.jpg`;
      await deps.objects.write(key, preview.bytes, 'image/jpeg');
      previews[width] = key;
    }
    row.previews = previews;
  });
  await deps.db.refresh(file);
};
