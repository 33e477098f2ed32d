import * as z from 'zod/mini';
import { type Failure, failure } from '@/domain/failure';
import { lineProofShape } from '@/domain/ledger/verify/line-proof';
import { fail, ok, type Result } from '@/domain/result';

const HASH = z.string().check(z.regex(/^[0-9a-f]{64}$/));

/**
 * The whole file of one inspection, to be checked and worked out anew by anybody who is given it.
 * Documents are their exact text. docs/record-format.md says it member by member.
 */
const caseFileShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/case-file'),
  series: z.uuid(),
  inspection: z.uuid(),
  /** The series' verifier key, as the file claims it. */
  key: z.string(),
  /** Every line on this inspection, in order, with what it commits to; erased content is left out. */
  lines: z.array(
    z.strictObject({
      proof: lineProofShape,
      contents: z.array(
        z.strictObject({ role: z.string(), salt: HASH, document: z.nullable(z.string()) }),
      ),
    }),
  ),
  /** The batches of the inspection's chain, in order. */
  batches: z.array(z.string()),
  /** The rules documents that reports and verdicts point to by their hash. */
  rules: z.array(z.string()),
});

export type CaseFile = z.infer<typeof caseFileShape>;

export const readCaseFile = (text: string): Result<CaseFile, Failure> => {
  try {
    const read = caseFileShape.safeParse(JSON.parse(text));
    if (read.success) return ok(read.data);
  } catch {
    return fail(failure('damaged-file', 'The case file is not JSON.'));
  }
  return fail(failure('damaged-file', 'The case file is not of a form this version can read.'));
};
