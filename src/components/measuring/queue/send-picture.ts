import { postJson, putBytes } from '../../uploads/network';
import { type SendDeps, sendUpload } from '../../uploads/send-upload';
import { readPicture } from './picture-store';
import type { PictureAnswer } from './send-waiting';

/** The device holds the picture until its row is seen on the server: how far a try came is not kept. */
const network: SendDeps = {
  post: postJson,
  put: putBytes,
  keep: async () => {},
  now: () => Date.now(),
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
  const announce = `/api/inspections/${inspectionId}/photographs`;
  const outcome = await sendUpload(
    {
      id: fileId,
      group: inspectionId,
      name,
      type,
      bytes: bytes.byteLength,
      announce,
      fields: { item },
      confirm: `${announce}/{id}`,
      announceAct,
      confirmAct,
      keptAt: Date.now(),
      paused: false,
      tags: [],
    },
    new Blob([bytes], { type }),
    network,
    new AbortController().signal,
    () => {},
  );
  switch (outcome.kind) {
    case 'answered':
      return outcome.answer.state === 'kept'
        ? { kind: 'kept' }
        : { kind: 'refused', detail: outcome.answer.refusedBecause ?? 'It was refused.' };
    case 'refused':
      return outcome;
    case 'sign-in':
      return { kind: 'sign-in' };
    case 'no-signal':
    case 'stopped':
      return { kind: 'unreachable' };
  }
};
