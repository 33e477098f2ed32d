import {
  NOTICE_FILE_NAME,
  type NoticeFile,
  readNoticeFile,
} from '@/domain/ledger/verify/notice-file';
import { findAttachment, isPdf, MOST_BYTES } from './find-attachment';

export type ReadFile =
  | { readonly kind: 'notice'; readonly file: NoticeFile; readonly pdf?: Uint8Array }
  | { readonly kind: 'case-file'; readonly text: string }
  /** Why there is nothing to check, and what to do. */
  | { readonly kind: 'unreadable'; readonly why: string };

const typeOf = (text: string): unknown => {
  try {
    return (JSON.parse(text) as { type?: unknown } | null)?.type;
  } catch {
    return undefined;
  }
};

const unreadable = (why: string): ReadFile => ({ kind: 'unreadable', why });

/** A notice's PDF, the file it carries, or a case file, told apart by what is in them. */
export const readFile = async (bytes: Uint8Array): Promise<ReadFile> => {
  if (bytes.length > MOST_BYTES) return unreadable('This file is too large to be a notice.');
  if (isPdf(bytes)) {
    const text = await findAttachment(bytes, NOTICE_FILE_NAME);
    if (text === undefined) {
      return unreadable(
        'This PDF carries no notice that can be checked: it is another PDF, or it was printed or saved anew and lost what was attached. Check by the notice’s number instead.',
      );
    }
    const file = readNoticeFile(text);
    return file.ok
      ? { kind: 'notice', file: file.value, pdf: bytes }
      : unreadable(`The file attached to this PDF cannot be read. ${file.failure.detail}`);
  }
  const text = new TextDecoder().decode(bytes);
  if (typeOf(text) === 'tagwire/case-file') return { kind: 'case-file', text };
  const file = readNoticeFile(text);
  return file.ok
    ? { kind: 'notice', file: file.value }
    : unreadable('This is neither a notice’s PDF nor a notice or case file.');
};
