import { readPicture } from './picture-store';
import type { PictureAnswer } from './send-waiting';

interface Told {
  readonly url?: string;
  readonly type?: string;
  readonly state?: string;
  readonly refusedBecause?: string;
  readonly detail?: string;
}

const TIMEOUT_MS = 120_000;

const post = async (path: string, body: unknown) => {
  const response = await fetch(path, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
    signal: AbortSignal.timeout(TIMEOUT_MS),
  });
  return { status: response.status, told: (await response.json()) as Told };
};

const refusal = (status: number, { detail }: Told): PictureAnswer => {
  if (status === 401) return { kind: 'sign-in' };
  if (status >= 500 || status === 429) return { kind: 'unreachable' };
  return { kind: 'refused', detail: detail ?? `The server answered ${status}.` };
};

/**
 * Announces a picture, puts its bytes into the object store and has them read back. Whatever broke off
 * before is begun again under the same ids: what the server has already, it answers as before.
 */
export const sendPicture = async (pictureId: string): Promise<PictureAnswer> => {
  const picture = await readPicture(pictureId);
  if (picture === undefined)
    return { kind: 'refused', detail: 'This device no longer holds the picture. Take it again.' };
  const { fileId, inspectionId, name, type, bytes, item, announceAct, confirmAct } = picture;
  const base = `/api/inspections/${inspectionId}/photographs`;
  try {
    const announced = await post(base, {
      act: announceAct,
      fileId,
      item,
      name,
      type,
      bytes: bytes.byteLength,
    });
    if (announced.status !== 200 || announced.told.url === undefined)
      return refusal(announced.status, announced.told);
    const put = await fetch(announced.told.url, {
      method: 'PUT',
      body: bytes,
      headers: { 'content-type': announced.told.type ?? type },
      signal: AbortSignal.timeout(TIMEOUT_MS),
    });
    // An answer that nobody reads is cut off when the page is left, as if the sending had failed.
    await put.arrayBuffer();
    if (!put.ok) return { kind: 'unreachable' };
    const kept = await post(`${base}/${fileId}`, { act: confirmAct });
    if (kept.status !== 200) return refusal(kept.status, kept.told);
    return kept.told.state === 'kept'
      ? { kind: 'kept' }
      : { kind: 'refused', detail: kept.told.refusedBecause ?? 'It was refused.' };
  } catch {
    return { kind: 'unreachable' };
  }
};
