import type { ExpectUploadResponse, KeptFileAnswer } from '@/contracts/file/file';
import { newId, post, Refusal } from '../api';

export interface FileToSend {
  readonly fileId: string;
  readonly paperworkId: string;
  readonly purpose: 'photograph' | 'sheet';
  readonly item: string;
  readonly file: File;
}

/** Straight to the object store; `onProgress` gets 0 to 1. */
const put = (url: string, type: string, file: File, onProgress: (share: number) => void) =>
  new Promise<void>((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open('PUT', url);
    request.setRequestHeader('content-type', type);
    request.upload.onprogress = (event) =>
      event.lengthComputable && onProgress(event.loaded / event.total);
    request.onload = () =>
      request.status < 300
        ? resolve()
        : reject(new Error(`The file store answered ${request.status}. Send it again.`));
    request.onerror = () => reject(new Error('The connection was lost. Send it again.'));
    request.send(file);
  });

/** Announces, sends and has the server read back one file. Throws with words where it did not arrive. */
export const sendFile = async (
  { fileId, paperworkId, purpose, item, file }: FileToSend,
  onProgress: (share: number) => void,
): Promise<KeptFileAnswer> => {
  const { name, type, size: bytes } = file;
  const announced = { act: newId(), fileId, purpose, item, name, type, bytes };
  const expected = await post<ExpectUploadResponse>(
    `/api/paperwork/${paperworkId}/files`,
    announced,
  );
  await put(expected.url, expected.type, file, onProgress);
  return post<KeptFileAnswer>(`/api/files/${fileId}/confirm`, { act: newId() });
};

export const failureWords = (error: unknown): string => {
  if (error instanceof Refusal) return error.detail;
  return error instanceof TypeError
    ? 'No connection. Send it again when there is one.'
    : error instanceof Error
      ? error.message
      : 'Not sent.';
};
