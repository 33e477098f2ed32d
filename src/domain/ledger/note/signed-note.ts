import { type Failure, failure } from '../../failure';
import { fail, ok, type Result } from '../../result';
import { concat, findBase64, findHex, toBase64, toHex, utf8 } from '../bytes';
import { isKeyName, type VerifierKey, verifySignature } from './verifier-key';

/** A C2SP signed note: a text that ends in a newline, and who signed it. */
export interface Note {
  readonly text: string;
  readonly signatures: readonly NoteSignature[];
}

export interface NoteSignature {
  readonly name: string;
  /** Eight hex digits. */
  readonly id: string;
  readonly signature: Uint8Array;
}

export interface NoteSigner {
  readonly key: VerifierKey;
  readonly sign: (message: Uint8Array) => Uint8Array | Promise<Uint8Array>;
}

const LONGEST = 1_000_000;
const MOST_SIGNATURES = 100;
/** C2SP allows no ASCII control character but the newline, and only valid Unicode. */
const isNoteContent = (written: string): boolean =>
  !/\p{Surrogate}/u.test(written) &&
  !Array.from(written).some((char) => char < ' ' && char !== '\n');

const damaged = (detail: string) => fail(failure('damaged-file', detail));

const isNoteText = (text: string): boolean => text.endsWith('\n') && isNoteContent(text);

/** The bytes that are signed: the text with its last newline, without the blank line after it. */
export const noteMessage = (text: string): Uint8Array => utf8(text);

export const formatNote = (note: Note): string => {
  if (!isNoteText(note.text)) throw new TypeError('A note text ends in a newline.');
  const lines = note.signatures.map(({ name, id, signature }) => {
    const idBytes = findHex(id, 4);
    if (idBytes === undefined || !isKeyName(name)) throw new TypeError('Not a key name and id.');
    return `— ${name} ${toBase64(concat(idBytes, signature))}\n`;
  });
  return `${note.text}\n${lines.join('')}`;
};

export const signNote = async (text: string, signers: readonly NoteSigner[]): Promise<string> => {
  const signatures = await Promise.all(
    signers.map(async ({ key, sign }) => ({
      name: key.name,
      id: key.id,
      signature: await sign(noteMessage(text)),
    })),
  );
  return formatNote({ text, signatures });
};

export const parseNote = (written: string): Result<Note, Failure> => {
  const cut = written.lastIndexOf('\n\n');
  if (written.length > LONGEST || !isNoteContent(written) || cut < 0 || !written.endsWith('\n')) {
    return damaged('This is not a signed note.');
  }
  const lines = written.slice(cut + 2, -1).split('\n');
  if (lines.length > MOST_SIGNATURES) return damaged('The note has too many signatures.');
  const signatures = lines.map(parseSignature);
  const read = signatures.filter((signature) => signature !== undefined);
  if (read.length !== lines.length) return damaged('A signature line of the note is damaged.');
  return ok({ text: written.slice(0, cut + 1), signatures: read });
};

const parseSignature = (line: string): NoteSignature | undefined => {
  const [, name = '', encoded = ''] = /^— (\S+) (\S+)$/u.exec(line) ?? [];
  const bytes = findBase64(encoded);
  if (bytes === undefined || bytes.length < 5 || !isKeyName(name)) return undefined;
  return { name, id: toHex(bytes.slice(0, 4)), signature: bytes.slice(4) };
};

/**
 * The note's text and which of the trusted keys signed it. Signatures of unknown keys are
 * passed over; a bad one of a known key refuses the whole note, and so does none of a known key.
 */
export const openNote = (
  written: string,
  keys: readonly VerifierKey[],
): Result<{ readonly text: string; readonly signedBy: readonly VerifierKey[] }, Failure> => {
  const note = parseNote(written);
  if (!note.ok) return note;
  const message = noteMessage(note.value.text);
  const signedBy = new Set<VerifierKey>();
  for (const { name, id, signature } of note.value.signatures) {
    const key = keys.find((known) => known.name === name && known.id === id);
    if (key === undefined) continue;
    if (!verifySignature(key, message, signature)) {
      return damaged(`The signature of ${name} does not fit this text.`);
    }
    signedBy.add(key);
  }
  if (signedBy.size === 0) return damaged('None of the trusted keys signed this.');
  return ok({ text: note.value.text, signedBy: [...signedBy] });
};
