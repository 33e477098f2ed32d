import * as z from 'zod/mini';
import type { Operation } from '../operation';
import { act, draftAnswer, draftRequest, savedAnswer } from './drafts';
import { bulletinContent, rulebookContent } from './edition';
import { instant, short } from './text';

const id = z.uuid();

/** A new draft: of the class's next edition, or of a bulletin. */
export const openDraftRequest = z.discriminatedUnion('kind', [
  z.strictObject({ act, id, kind: z.literal('edition'), title: short, content: rulebookContent }),
  z.strictObject({ act, id, kind: z.literal('bulletin'), content: bulletinContent }),
]);

export const publishRequest = z.strictObject({
  act,
  version: z.int(),
  /** For an edition; absent or past, it is in force at once. */
  inForceAt: z.optional(z.nullable(instant)),
});

export const operations: readonly Operation[] = [
  {
    method: 'get',
    path: '/api/rulebooks/schema.json',
    summary: 'The JSON Schema of a rulebook as a file.',
    access: 'public',
  },
  {
    method: 'post',
    path: '/api/rulebooks/classes/{class}/drafts',
    summary: 'Open a draft: of the next edition, imported whole or not at all, or of a bulletin.',
    access: 'signed-in',
    body: openDraftRequest,
    answer: z.strictObject({ draftId: id }),
  },
  {
    method: 'get',
    path: '/api/rulebooks/drafts/{draft}',
    summary: 'Read a draft; its version is the entity tag.',
    access: 'signed-in',
    answer: draftAnswer,
  },
  {
    method: 'put',
    path: '/api/rulebooks/drafts/{draft}',
    summary:
      'Keep a draft. If-Match names the version it grew from; a newer one answers 412 with the newer draft in `newer`.',
    access: 'signed-in',
    body: draftRequest,
    answer: savedAnswer,
  },
  {
    method: 'post',
    path: '/api/rulebooks/drafts/{draft}/publish',
    summary: 'Publish a draft: refused with its faults while anything in it is ambiguous.',
    access: 'signed-in',
    body: publishRequest,
    answer: z.object({ number: z.int(), hash: z.string() }),
  },
];
