import { partSizes } from '@/domain/paperwork/file/limits';

/** A file on its way to the server, as it is kept on the device until the server has confirmed it. */
export interface Upload {
  /** Client-made UUIDv7: the file's id on the server. */
  readonly id: string;
  /** What it belongs to; a page shows and sends the uploads of its own group. */
  readonly group: string;
  readonly name: string;
  readonly type: string;
  readonly bytes: number;
  /** Where it is announced, and what is said there beside id, name, type and size. */
  readonly announce: string;
  readonly fields: Readonly<Record<string, string>>;
  /** Where it is confirmed, and taken out again; `{id}` stands for its id. */
  readonly confirm: string;
  readonly remove?: string | undefined;
  readonly announceAct: string;
  readonly confirmAct: string;
  /** Instants by the device's clock, in milliseconds. */
  readonly keptAt: number;
  readonly announcedAt?: number | undefined;
  readonly paused: boolean;
  /** Something on record names this file by its id: however late, it is sent under that id. */
  readonly named?: boolean | undefined;
  /** The store's answers to the parts that arrived, by part; of one request there is one. */
  readonly tags: readonly string[];
}

export interface UploadAddress {
  readonly url: string;
  readonly type: string;
  readonly parts?: readonly { readonly url: string; readonly bytes: number }[] | undefined;
}

/** What the server made of the file. */
export interface UploadAnswer {
  readonly state: 'kept' | 'refused';
  readonly sha256?: string | undefined;
  readonly bytes?: number | undefined;
  readonly type?: string | undefined;
  readonly keptAt?: string | undefined;
  readonly refusedBecause?: string | undefined;
}

export type UploadOutcome =
  | { readonly kind: 'answered'; readonly answer: UploadAnswer }
  /** Read and refused: the same again changes nothing. */
  | { readonly kind: 'refused'; readonly detail: string }
  | { readonly kind: 'sign-in' }
  /** No answer, or none that says what became of it: later it goes on. */
  | { readonly kind: 'no-signal' }
  | { readonly kind: 'stopped' };

/** The server gives up an announced file after a day. */
const ANNOUNCED_MS = 20 * 60 * 60 * 1000;

export const isStale = ({ announcedAt }: Upload, now: number): boolean =>
  announcedAt !== undefined && now - announcedAt > ANNOUNCED_MS;

/** The same file, to be announced anew: under another id, unless the record names this one. */
export const renewed = (upload: Upload, newId: () => string): Upload => ({
  ...upload,
  id: upload.named ? upload.id : newId(),
  announceAct: newId(),
  confirmAct: newId(),
  announcedAt: undefined,
  tags: [],
});

/** How much of it arrived before, 0 to 1. */
export const arrivedShare = ({ bytes, tags }: Upload): number => {
  const sizes = partSizes(bytes);
  const parts = sizes.length === 0 ? [bytes] : sizes;
  const arrived = parts.reduce((sum, size, at) => sum + (tags[at] ? size : 0), 0);
  return bytes === 0 ? 0 : arrived / bytes;
};

export const pathOf = (path: string, upload: Pick<Upload, 'id'>): string =>
  path.replace('{id}', upload.id);
