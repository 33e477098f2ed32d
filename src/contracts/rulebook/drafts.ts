import * as z from 'zod/mini';
import { bulletinContent, rulebookContent } from './edition';
import { clauseNumber, instant, long, short } from './text';

/** Made by the client, so that sending twice is one act. */
export const act = z.uuid();

/** A draft as autosaved: the whole of it, with the version it grew from in `If-Match`. */
export const draftRequest = z.discriminatedUnion('kind', [
  z.strictObject({ act, kind: z.literal('edition'), title: short, content: rulebookContent }),
  z.strictObject({ act, kind: z.literal('bulletin'), title: short, content: bulletinContent }),
]);

/** The same with its content still unread: the use case names what is wrong in it, place by place. */
export const unreadDraftRequest = z.strictObject({
  act,
  kind: z.enum(['edition', 'bulletin']),
  title: short,
  content: z.unknown(),
});

const content = z.union([rulebookContent, bulletinContent]);

export const draftAnswer = z.strictObject({
  id: z.string(),
  kind: z.enum(['edition', 'bulletin']),
  title: z.string(),
  version: z.int(),
  updatedBy: z.string(),
  updatedAt: instant,
  content,
});

export const savedAnswer = z.strictObject({ version: z.int(), savedAt: instant });

export const questionRequest = z.strictObject({
  act,
  clause: clauseNumber,
  question: long,
});
