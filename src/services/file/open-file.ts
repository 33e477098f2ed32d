import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../ports';
import { MOST_PHOTOGRAPH_BYTES, makePreviews, PREVIEW_WIDTHS } from './make-previews';
import { findReadableFile } from './own-file';
import { withStore } from './with-store';

export interface OpenedFile {
  readonly bytes: Uint8Array;
  readonly type: string;
  readonly name: string;
}

/** A preview of a photograph: a JPEG of this width without position data. Whoever asks before the job has run waits for it. */
export const openPreview = async (
  deps: Pick<Ports, 'db' | 'objects' | 'images'>,
  actor: Actor,
  input: { readonly fileId: string; readonly width: number },
): Promise<Result<OpenedFile, Failure>> => {
  const file = await findReadableFile(deps.db, actor, input.fileId);
  const width = PREVIEW_WIDTHS.find((one) => one === input.width);
  if (file === undefined || width === undefined || file.state !== 'kept') return fail(absent());
  const { seriesId, id: fileId } = file;
  return withStore(async () => {
    if (!file.previews && file.purpose !== 'sheet') await makePreviews(deps, { seriesId, fileId });
    const key = file.previews?.[String(width)];
    if (key === undefined) return fail(failure('unavailable', 'This file has no preview.'));
    const bytes = await deps.objects.read(key, MOST_PHOTOGRAPH_BYTES);
    return ok({ bytes, type: 'image/jpeg', name: `${width}.jpg` });
  });
};

/** The file byte for byte, as it was sent; it may hold position data, so it goes to the parties only. */
export const openOriginal = async (
  deps: Pick<Ports, 'db' | 'objects'>,
  actor: Actor,
  input: { readonly fileId: string },
): Promise<Result<OpenedFile, Failure>> => {
  const file = await findReadableFile(deps.db, actor, input.fileId);
  const { objectKey, mediaType, name } = file ?? {};
  if (!objectKey || !mediaType || !name) return fail(absent());
  return withStore(async () => {
    const bytes = await deps.objects.read(objectKey, MOST_PHOTOGRAPH_BYTES);
    return ok({ bytes, type: mediaType, name });
  });
};
