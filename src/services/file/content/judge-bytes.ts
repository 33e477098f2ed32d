import { type Failure, failure } from '@/domain/failure';
import { sha256 } from '@/domain/ledger/bytes';
import { fail, type Result } from '@/domain/result';
import type { FileFacts } from './file-facts';

/** Bytes that arrived, and what they are by themselves or why they are not taken. */
export interface Judged {
  readonly bytes: Uint8Array;
  readonly hash: Uint8Array;
  readonly facts: Result<FileFacts, Failure>;
}

/** @param announced how many bytes were to come: fewer or more are another file. */
export const judgeBytes = async (
  bytes: Uint8Array,
  announced: number,
  inspect: (bytes: Uint8Array) => Promise<Result<FileFacts, Failure>>,
): Promise<Judged> => {
  const words = `${announced} bytes were announced and ${bytes.length} arrived. Send the file again.`;
  const facts =
    bytes.length === announced ? await inspect(bytes) : fail(failure('damaged-file', words));
  return { bytes, hash: sha256(bytes), facts };
};

/** What is larger than any such file may be is not read at all. */
export const unread = (reason: Failure): Judged => {
  const bytes = new Uint8Array();
  return { bytes, hash: sha256(bytes), facts: fail(reason) };
};
