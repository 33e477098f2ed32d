import { deviceWord, newId } from '../../paperwork/api';
import type { Upload } from '../../uploads/upload';
import { openUploadQueue, type UploadQueue } from '../../uploads/upload-queue';
import { waitedWords } from './waited-words';

const GROUP = 'engine swaps';
let queue: UploadQueue | undefined;

/** Says in words how photographs of swaps on this device stand; those that wait are sent on. */
export const watchPhotographs = (say: (words: string | undefined) => void): (() => void) => {
  const opened = openUploadQueue(GROUP, {
    changed: (list) => {
      const [one] = list;
      if (one === undefined) return;
      say(
        one.phase === 'refused'
          ? `The photograph was refused: ${one.detail ?? 'take another one'}.`
          : `The photograph is being sent, ${Math.round(one.share * 100)} %.${waitedWords(one.upload.keptAt, Date.now(), deviceWord())}`,
      );
    },
    answered: (_upload, answer) =>
      say(
        answer.state === 'kept'
          ? 'The photograph is with them.'
          : `The photograph was refused: ${answer.refusedBecause ?? 'take another one'}.`,
      ),
  });
  queue = opened;
  return () => {
    queue = undefined;
    opened.stop();
  };
};

/** Keeps the photograph on the device and sends it; goes on by itself after a lost connection. */
export const sendPhotograph = async (
  paperworkId: string,
  fileId: string,
  file: File,
): Promise<void> => {
  const upload: Upload = {
    id: fileId,
    group: GROUP,
    name: file.name,
    type: file.type,
    bytes: file.size,
    announce: `/api/paperwork/${paperworkId}/files`,
    fields: { purpose: 'photograph', item: 'engine-swap' },
    confirm: '/api/files/{id}/confirm',
    remove: '/api/files/{id}/remove',
    announceAct: newId(),
    confirmAct: newId(),
    keptAt: Date.now(),
    paused: false,
    // The swap names the photograph by this id, with its hash.
    named: true,
    tags: [],
  };
  await queue?.add(upload, file);
};
