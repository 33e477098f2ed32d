import { useCallback, useState } from 'react';
import { newId, post } from '../api';
import type { ShownFile } from '../paperwork-props';
import { failureWords, sendFile } from './send-file';

/** A file on its way. */
export interface Sending {
  readonly fileId: string;
  readonly purpose: 'photograph' | 'sheet';
  readonly item: string;
  readonly file: File;
  /** 0 to 1; 1 while the server reads it back. */
  readonly share: number;
  /** Why it did not arrive; it can be sent again. */
  readonly failed?: string | undefined;
}

/** Files of one paperwork: those that are kept or refused, and those on their way, each with its progress. */
export const useFiles = (
  paperworkId: string,
  before: readonly ShownFile[],
  onKept: (file: ShownFile) => void = () => undefined,
) => {
  const [files, setFiles] = useState(before);
  const [sending, setSending] = useState<readonly Sending[]>([]);

  const run = useCallback(
    async (one: Sending) => {
      const { fileId, purpose, item, file } = one;
      const update = (change: Partial<Sending>) =>
        setSending((list) =>
          list.map((other) => (other.fileId === fileId ? { ...other, ...change } : other)),
        );
      try {
        const answer = await sendFile({ fileId, paperworkId, purpose, item, file }, (share) =>
          update({ share }),
        );
        const shown: ShownFile = {
          fileId,
          purpose,
          item,
          name: file.name,
          state: answer.state,
          refusedBecause: answer.refusedBecause ?? null,
          keptAt: answer.keptAt ?? null,
          sha256: answer.sha256 ?? '',
          bytes: String(answer.bytes ?? file.size),
          type: answer.type ?? file.type,
          picture: purpose === 'photograph' ? URL.createObjectURL(file) : undefined,
        };
        setSending((list) => list.filter((other) => other.fileId !== fileId));
        setFiles((list) => [...list, shown]);
        if (shown.state === 'kept') onKept(shown);
      } catch (error) {
        update({ failed: failureWords(error) });
      }
    },
    [paperworkId, onKept],
  );

  const add = useCallback(
    (list: readonly File[], purpose: Sending['purpose'], item: string) => {
      const added = list.map((file) => ({ fileId: newId(), purpose, item, file, share: 0 }));
      setSending((before) => [...before, ...added]);
      for (const one of added) void run(one);
    },
    [run],
  );

  const retry = useCallback(
    (failed: Sending) => {
      // A new name: the store may hold half of the old one.
      const fresh = { ...failed, fileId: newId(), share: 0, failed: undefined };
      setSending((list) => list.map((one) => (one.fileId === failed.fileId ? fresh : one)));
      void run(fresh);
    },
    [run],
  );

  const drop = useCallback(
    (fileId: string) => setSending((list) => list.filter((one) => one.fileId !== fileId)),
    [],
  );

  const remove = useCallback(async (fileId: string) => {
    await post(`/api/files/${fileId}/remove`, { act: newId() });
    setFiles((list) => list.filter((file) => file.fileId !== fileId));
  }, []);

  return { files, sending, add, retry, drop, remove };
};

export type Files = ReturnType<typeof useFiles>;
