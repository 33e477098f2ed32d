import { type Failure, failure } from '../failure';
import { fail, ok, type Result } from '../result';
import { findBase64, findWhole, toBase64 } from './bytes';
import { type NoteSigner, openNote, parseNote, signNote } from './note/signed-note';
import { isKeyName, type VerifierKey } from './note/verifier-key';

/** The head of a ledger, C2SP tlog-checkpoint. */
export interface Checkpoint {
  /** `<name>/<series id>`: says whose ledger, need not be an address. */
  readonly origin: string;
  readonly size: number;
  readonly root: Uint8Array;
  /** By the server's clock, `YYYY-MM-DDTHH:MM:SS.mmmZ`; heads of before it was signed have none. */
  readonly signedAt?: string;
}

/** Begins the extension line that carries the time. */
const SIGNED_AT = 'tagwire/signed-at ';
const INSTANT = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/;

const damaged = (detail: string) => fail(failure('damaged-file', detail));

export const originOf = (name: string, series: string): string => `${name}/${series}`;

/** Whether the ledger of this origin is the one that lines of this series stand in. */
export const isOriginOf = (origin: string, series: string): boolean =>
  origin.slice(origin.lastIndexOf('/') + 1) === series;

/** Origin, size in decimal, root in base64, and the time where there is one; a newline after each. */
export const checkpointText = ({ origin, size, root, signedAt }: Checkpoint): string => {
  if (!isKeyName(origin) || !Number.isSafeInteger(size) || size < 0 || root.length !== 32) {
    throw new TypeError('Not a checkpoint.');
  }
  if (signedAt !== undefined && !INSTANT.test(signedAt)) throw new TypeError('Not an instant.');
  const time = signedAt === undefined ? '' : `${SIGNED_AT}${signedAt}\n`;
  return `${origin}\n${size}\n${toBase64(root)}\n${time}`;
};

export const parseCheckpointText = (text: string): Result<Checkpoint, Failure> => {
  const [origin = '', sizeText = '', rootText = '', ...rest] = text.split('\n');
  const size = findWhole(sizeText);
  const root = findBase64(rootText);
  // The last newline leaves one empty piece; extension lines before it may stand, unread but the time.
  const ends = rest.length >= 1 && rest.indexOf('') === rest.length - 1;
  if (origin === '' || size === undefined || root?.length !== 32 || !ends) {
    return damaged('This is not a checkpoint.');
  }
  const [signedAt, second] = rest
    .filter((line) => line.startsWith(SIGNED_AT))
    .map((line) => line.slice(SIGNED_AT.length));
  if (signedAt === undefined) return ok({ origin, size, root });
  return second === undefined && INSTANT.test(signedAt)
    ? ok({ origin, size, root, signedAt })
    : damaged('The checkpoint says no instant at which it was signed.');
};

export const signCheckpoint = (
  checkpoint: Checkpoint,
  signers: readonly NoteSigner[],
): Promise<string> => signNote(checkpointText(checkpoint), signers);

/** What a checkpoint says, unverified: for display and for finding the key to ask for. */
export const peekCheckpoint = (written: string): Result<Checkpoint, Failure> => {
  const note = parseNote(written);
  return note.ok ? parseCheckpointText(note.value.text) : note;
};

/** A checkpoint counts when a trusted key that bears the ledger's own name signed it. */
export const openCheckpoint = (
  written: string,
  keys: readonly VerifierKey[],
): Result<Checkpoint, Failure> => {
  const note = openNote(written, keys);
  if (!note.ok) return note;
  const checkpoint = parseCheckpointText(note.value.text);
  if (!checkpoint.ok) return checkpoint;
  return note.value.signedBy.some((key) => key.name === checkpoint.value.origin)
    ? checkpoint
    : damaged('The key that signed this checkpoint is not the key of this ledger.');
};
