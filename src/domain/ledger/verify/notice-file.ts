import * as z from 'zod/mini';
import { type Failure, failure } from '../../failure';
import { fail, ok, type Result } from '../../result';
import { canonicalJson } from '../canonical';
import { lineProofShape } from './line-proof';

const HASH = z.string().check(z.regex(/^[0-9a-f]{64}$/));

/** What a notice's PDF carries as an attached file. `document` is the exact canonical text. */
const noticeFileShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/notice'),
  document: z.string(),
  /** The role under which the line commits to the document. */
  role: z.string(),
  salt: HASH,
  proof: lineProofShape,
  /** The series' verifier key as the file claims it; to be compared with the published one. */
  key: z.string(),
});

export type NoticeFile = z.infer<typeof noticeFileShape>;

/** What is served beside a notice's PDF: the proof of the second line, which holds the PDF's hash. */
const pdfFileShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/notice-pdf'),
  salt: HASH,
  proof: lineProofShape,
});

export type PdfFile = z.infer<typeof pdfFileShape>;

/** The name of the attachment in the PDF. */
export const NOTICE_FILE_NAME = 'tagwire-notice.json';

export const writeNoticeFile = (file: Omit<NoticeFile, 'v' | 'type'>): string =>
  canonicalJson({ v: '1', type: 'tagwire/notice', ...file });

export const writePdfFile = (file: Omit<PdfFile, 'v' | 'type'>): string =>
  canonicalJson({ v: '1', type: 'tagwire/notice-pdf', ...file });

export const readNoticeFile = (text: string): Result<NoticeFile, Failure> =>
  read(text, noticeFileShape);

export const readPdfFile = (text: string): Result<PdfFile, Failure> => read(text, pdfFileShape);

const read = <T>(text: string, shape: z.ZodMiniType<T>): Result<T, Failure> => {
  try {
    const parsed = shape.safeParse(JSON.parse(text));
    if (parsed.success) return ok(parsed.data);
  } catch {
    return fail(failure('damaged-file', 'The proof is not JSON.'));
  }
  return fail(failure('damaged-file', 'The proof is not of a form this version can read.'));
};
