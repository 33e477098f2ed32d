import { inflateSync } from 'node:zlib';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { FileFacts } from './file-facts';

/** Names in a PDF behind which a program, another file or an outside call can stand (ISO 32000-2). */
const ACTIVE =
  /\/(JavaScript|JS|Launch|EmbeddedFiles?|RichMedia|XFA|SubmitForm|ImportData)(?![A-Za-z0-9])/;
const MOST_OBJECT_BYTES = 8_000_000;

const refuse = (detail: string): Result<FileFacts, Failure> =>
  fail(failure('unsupported-file', `${detail} Print it into a new PDF and add that.`));

/** Names may be written with their characters as `#6A` (7.3.5). */
const withoutEscapes = (text: string): string =>
  text.replace(/#([0-9A-Fa-f]{2})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)));

/** Text of the compressed streams that hold objects (7.5.7); nothing where one cannot be looked into. */
const objectStreams = (bytes: Uint8Array, text: string): string | undefined => {
  let found = '';
  for (const { index, 0: head } of text.matchAll(/stream\r?\n/g)) {
    if (text.slice(index - 3, index) === 'end') continue;
    const dictionary = withoutEscapes(
      text.slice(Math.max(0, text.lastIndexOf(' obj', index)), index),
    );
    if (!/\/Type\s*\/ObjStm/.test(dictionary)) continue;
    if (!/\/Filter\s*\[?\s*\/FlateDecode\s*\]?/.test(dictionary)) return undefined;
    try {
      const from = index + head.length;
      const packed = bytes.subarray(from, text.indexOf('endstream', from));
      const left = MOST_OBJECT_BYTES - found.length;
      found += inflateSync(packed, { maxOutputLength: Math.max(1, left) }).toString('latin1');
    } catch {
      return undefined;
    }
  }
  return found;
};

/** A PDF is kept to be looked at, never run: one that carries a program or another file is refused. */
export const inspectPdf = (bytes: Uint8Array): Result<FileFacts, Failure> => {
  const text = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.length).toString('latin1');
  if (!text.slice(-2_048).includes('%%EOF')) {
    const detail =
      'This PDF document is damaged or was cut short on its way. Save or send it again.';
    return fail(failure('damaged-file', detail));
  }
  if (/\/Encrypt(?![A-Za-z0-9])/.test(withoutEscapes(text)))
    return refuse('This PDF document is locked, so nobody can see what it carries.');
  const inside = objectStreams(bytes, text);
  if (inside === undefined)
    return refuse('Part of this PDF document is packed so that it cannot be looked into.');
  if (ACTIVE.test(withoutEscapes(text)) || ACTIVE.test(withoutEscapes(inside)))
    return refuse('This PDF document carries a program, a form that sends, or another file.');
  return ok({ type: 'application/pdf', width: null, height: null });
};
