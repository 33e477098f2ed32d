import * as z from 'zod/mini';
import { clauseNumber } from '../rulebook/text';

const uuid = z.guid('This is not an id.');
const words = z.string().check(z.maxLength(4_000, 'At most 4000 characters.'));

/** An official's decision as written down; what may be published is the domain's to say. */
export const decisionDraft = z.strictObject({
  reportRevision: z.int().check(z.minimum(1)),
  decision: z.enum(['breach', 'no-breach'], 'Choose breach or no breach.'),
  clauses: z.array(clauseNumber).check(z.maxLength(40)),
  penalty: z.nullable(
    z.strictObject({
      row: z.string().check(z.maxLength(40)),
      step: z.int().check(z.minimum(1), z.maximum(99)),
    }),
  ),
  moneyMinor: z.nullable(z.int().check(z.minimum(0), z.maximum(1_000_000_000))),
  reasons: words,
  againstComputedBecause: words,
});

const act = uuid;

export const saveDraftRequest = z.strictObject({
  act,
  inspectionId: uuid,
  /** Version of the draft that was opened; `null` for the first. */
  version: z.nullable(z.int()),
  content: decisionDraft,
});

export const publishRequest = z.strictObject({ act, inspectionId: uuid, version: z.int() });

export const savedDraft = z.strictObject({ version: z.int() });
export const publishedVerdict = z.strictObject({ verdictId: uuid, number: z.string() });
