import {
  pathOf,
  type Upload,
  type UploadAddress,
  type UploadAnswer,
  type UploadOutcome,
} from './upload';

/** An answer of the server; nothing where none came. */
export interface PostAnswer {
  readonly status: number;
  readonly body: unknown;
}

/** What a sending needs of the network and the device; tests put their own in. */
export interface SendDeps {
  readonly post: (path: string, body: unknown) => Promise<PostAnswer | undefined>;
  /** The status and the store's tag; nothing where the connection was lost. */
  readonly put: (
    url: string,
    bytes: Blob,
    options: {
      readonly type?: string | undefined;
      readonly signal: AbortSignal;
      readonly onSent: (bytes: number) => void;
    },
  ) => Promise<{ readonly status: number; readonly tag: string } | undefined>;
  /** Writes what changed through to the device. */
  readonly keep: (change: Partial<Upload>) => Promise<void>;
  readonly now: () => number;
}

interface Problem {
  readonly detail?: string;
}

const NO_SIGNAL = { kind: 'no-signal' } as const;

const failed = (answer: PostAnswer | undefined): UploadOutcome | undefined => {
  if (answer === undefined || answer.status >= 500 || answer.status === 429) return NO_SIGNAL;
  if (answer.status === 401) return { kind: 'sign-in' };
  if (answer.status < 400) return undefined;
  const { detail = `The server answered ${answer.status}.` } = answer.body as Problem;
  return { kind: 'refused', detail };
};

/** Sends what has not arrived yet, part by part; what arrived is kept at once and never sent again. */
const sendBytes = async (
  upload: Upload,
  address: UploadAddress,
  bytes: Blob,
  deps: SendDeps,
  signal: AbortSignal,
  onShare: (share: number) => void,
): Promise<readonly string[] | UploadOutcome> => {
  const parts = address.parts ?? [{ url: address.url, bytes: bytes.size }];
  const type = address.parts === undefined ? address.type : undefined;
  const tags = parts.map((_, at) => upload.tags[at] ?? '');
  let from = 0;
  for (const [at, part] of parts.entries()) {
    const begin = from;
    from += part.bytes;
    onShare((tags[at] === '' ? begin : from) / bytes.size);
    if (tags[at] !== '') continue;
    const onSent = (sent: number) => onShare((begin + sent) / bytes.size);
    const answer = await deps.put(part.url, bytes.slice(begin, from), { type, signal, onSent });
    if (signal.aborted) return { kind: 'stopped' };
    // An address that grew old is asked for anew at the next try.
    if (answer === undefined || answer.status >= 400) return NO_SIGNAL;
    tags[at] = answer.tag === '' ? 'arrived' : answer.tag;
    await deps.keep({ tags });
  }
  return tags;
};

/**
 * Announces, sends and has the server read back one file. Everything may be asked again: the same
 * acts under the same ids, so that the file counts once however often the connection is lost.
 */
export const sendUpload = async (
  upload: Upload,
  bytes: Blob,
  deps: SendDeps,
  signal: AbortSignal,
  onShare: (share: number) => void,
): Promise<UploadOutcome> => {
  const { id: fileId, name, type, announceAct, fields } = upload;
  const announced = { act: announceAct, fileId, name, type, bytes: bytes.size, ...fields };
  const expected = await deps.post(upload.announce, announced);
  const notExpected = failed(expected);
  if (notExpected !== undefined) return notExpected;
  if (signal.aborted) return { kind: 'stopped' };
  if (upload.announcedAt === undefined) await deps.keep({ announcedAt: deps.now() });
  const address = expected?.body as UploadAddress;
  const sent = await sendBytes(upload, address, bytes, deps, signal, onShare);
  if ('kind' in sent) return sent;
  onShare(1);
  const confirmed = await deps.post(pathOf(upload.confirm, upload), {
    act: upload.confirmAct,
    ...(address.parts && { parts: sent.map((tag, at) => ({ number: at + 1, tag })) }),
  });
  if (confirmed?.status === 409 && upload.tags.length > 0) {
    // Kept here as arrived, and not there: all of it is sent again.
    await deps.keep({ tags: [] });
    return NO_SIGNAL;
  }
  const notConfirmed = failed(confirmed);
  return notConfirmed ?? { kind: 'answered', answer: confirmed?.body as UploadAnswer };
};
