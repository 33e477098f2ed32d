import * as z from 'zod/mini';
import type { Operation } from '../operation';
import { publishedVerdict, publishRequest, saveDraftRequest, savedDraft } from './decision';

const signedIn = { method: 'post', access: 'signed-in' } as const;

export const operations: readonly Operation[] = [
  {
    ...signedIn,
    path: '/api/verdicts/{series}/draft',
    summary: 'Write down a decision on an inspection; nothing is published.',
    body: saveDraftRequest,
    answer: savedDraft,
  },
  {
    ...signedIn,
    path: '/api/verdicts/{series}/publish',
    summary:
      'Publish the decision as it was written down: verdict, notice and ledger line at once.',
    body: publishRequest,
    answer: publishedVerdict,
  },
  {
    method: 'get',
    path: '/api/verdicts/{series}/{number}',
    summary:
      'A published notice: its exact document, the salt and the ledger line that commits to it.',
    access: 'public',
    answer: z.strictObject({
      document: z.string(),
      role: z.literal('notice'),
      salt: z.string(),
      line: z.string(),
      index: z.int(),
      pdf: z.nullable(z.strictObject({ sha256: z.string(), bytes: z.int() })),
    }),
  },
];
