import { MOST_AT_ONCE, partSizes } from '@/domain/paperwork/file/limits';
import { KeptFile } from '@/entities/paperwork/file';
import type { Ports } from '../../ports';

/** Where a file's bytes go, for a few minutes. */
export interface UploadAddress {
  readonly fileId: string;
  /** One PUT of all of it, with this type. */
  readonly url: string;
  readonly type: string;
  /** A larger file goes in parts, one PUT each; the answers' ETags are given back at the end. */
  readonly parts?: readonly { readonly url: string; readonly bytes: number }[];
}

type Deps = Pick<Ports, 'db' | 'objects' | 'uploads'>;

/** The store's name for the upload: the first one that was written down, whoever else asks at the same time. */
const uploadOf = async ({ db, uploads }: Deps, file: KeptFile): Promise<string> => {
  if (file.uploadId) return file.uploadId;
  const { seriesId, id, uploadKey } = file;
  const begun = await uploads.begin(uploadKey, file.declaredType);
  const written = await db.nativeUpdate(
    KeptFile,
    { seriesId, id, uploadId: null },
    { uploadId: begun },
  );
  if (written === 1) return begun;
  await uploads.drop(uploadKey, begun);
  const { uploadId } = await db.findOneOrFail(KeptFile, { seriesId, id }, { refresh: true });
  return uploadId ?? begun;
};

/** The address for all of a file's bytes in one request. */
export const addressWhole = async (
  { objects }: Pick<Ports, 'objects'>,
  file: Pick<KeptFile, 'id' | 'uploadKey' | 'declaredType' | 'declaredBytes'>,
): Promise<UploadAddress> => {
  const { id: fileId, uploadKey, declaredType: type, declaredBytes: bytes } = file;
  return { fileId, url: await objects.presignPut(uploadKey, type, bytes), type };
};

/** Addresses for the bytes of a file that was announced; asked again, new ones for the same upload. */
export const addressUpload = async (deps: Deps, file: KeptFile): Promise<UploadAddress> => {
  const { uploadKey, declaredBytes: bytes } = file;
  const whole = await addressWhole(deps, file);
  if (bytes <= MOST_AT_ONCE) return whole;
  const uploadId = await uploadOf(deps, file);
  const parts = await Promise.all(
    partSizes(bytes).map(async (size, at) => ({
      url: await deps.uploads.presign(uploadKey, uploadId, at + 1, size),
      bytes: size,
    })),
  );
  return { ...whole, parts };
};
