import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { Upload, UploadAnswer } from '../../uploads/upload';
import { openUploadQueue, type QueuedUpload, type UploadQueue } from '../../uploads/upload-queue';
import { newId, post } from '../api';
import type { ShownFile } from '../paperwork-props';

type Purpose = 'photograph' | 'sheet';

/** A file on its way. */
export interface Sending {
  readonly fileId: string;
  readonly purpose: Purpose;
  readonly item: string;
  readonly name: string;
  readonly phase: QueuedUpload['phase'];
  /** 0 to 1; 1 while the server reads it back. */
  readonly share: number;
  /** Whether the device holds it; otherwise this page alone does. */
  readonly kept: boolean;
  /** Why it was refused. */
  readonly failed?: string | undefined;
}

const sendingOf = ({ upload, phase, share, kept, detail }: QueuedUpload): Sending => ({
  fileId: upload.id,
  purpose: upload.fields['purpose'] as Purpose,
  item: upload.fields['item'] ?? '',
  name: upload.name,
  phase,
  share,
  kept,
  failed: phase === 'refused' ? (detail ?? 'It was refused.') : undefined,
});

/** Pictures that every browser shows; of others the server makes a preview. */
const SHOWN = /^image\/(jpeg|png|webp)$/;

const shownOf = (upload: Upload, answer: UploadAnswer, bytes: Blob): ShownFile => {
  const type = answer.type ?? upload.type;
  const isPicture = upload.fields['purpose'] === 'photograph' && answer.state === 'kept';
  return {
    fileId: upload.id,
    purpose: upload.fields['purpose'] as Purpose,
    item: upload.fields['item'] ?? '',
    name: upload.name,
    state: answer.state,
    refusedBecause: answer.refusedBecause ?? null,
    keptAt: answer.keptAt ?? null,
    sha256: answer.sha256 ?? '',
    bytes: String(answer.bytes ?? upload.bytes),
    type,
    picture: !isPicture
      ? undefined
      : SHOWN.test(type)
        ? URL.createObjectURL(bytes)
        : `/api/files/${upload.id}/preview/160`,
  };
};

/** Files of one paperwork: those that are kept or refused, and those on their way, each with its progress. */
export const useFiles = (
  paperworkId: string,
  before: readonly ShownFile[],
  onKept: (file: ShownFile) => void = () => undefined,
) => {
  const [files, setFiles] = useState(before);
  const [queued, setQueued] = useState<readonly QueuedUpload[]>([]);
  const queue = useRef<UploadQueue>(undefined);
  const hear = useRef(onKept);
  hear.current = onKept;
  const group = `paperwork ${paperworkId}`;

  useEffect(() => {
    const opened = openUploadQueue(group, {
      changed: setQueued,
      answered: (upload, answer, bytes) => {
        const shown = shownOf(upload, answer, bytes);
        setFiles((list) => [...list.filter((one) => one.fileId !== shown.fileId), shown]);
        if (shown.state === 'kept') hear.current(shown);
      },
    });
    queue.current = opened;
    return () => opened.stop();
  }, [group]);

  const add = useCallback(
    async (list: readonly File[], purpose: Purpose, item: string) => {
      for (const file of list) {
        const upload: Upload = {
          id: newId(),
          group,
          name: file.name,
          type: file.type,
          bytes: file.size,
          announce: `/api/paperwork/${paperworkId}/files`,
          fields: { purpose, item },
          confirm: '/api/files/{id}/confirm',
          remove: '/api/files/{id}/remove',
          announceAct: newId(),
          confirmAct: newId(),
          keptAt: Date.now(),
          paused: false,
          tags: [],
        };
        await queue.current?.add(upload, file);
      }
    },
    [group, paperworkId],
  );

  const sending = useMemo(() => queued.map(sendingOf), [queued]);
  const pause = useCallback((fileId: string) => queue.current?.pause(fileId), []);
  const goOn = useCallback((fileId: string) => queue.current?.goOn(fileId), []);
  const drop = useCallback((fileId: string) => queue.current?.drop(fileId), []);
  const remove = useCallback(async (fileId: string) => {
    await post(`/api/files/${fileId}/remove`, { act: newId() });
    setFiles((list) => list.filter((file) => file.fileId !== fileId));
  }, []);

  return { files, sending, add, pause, goOn, drop, remove };
};

export type Files = ReturnType<typeof useFiles>;
