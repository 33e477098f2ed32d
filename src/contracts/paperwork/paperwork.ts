import * as z from 'zod/mini';
import { paperworkDraft } from './draft';

const act = z.uuid('Send a UUID of your own making (version 7).');
const version = z.int().check(z.gte(1));

export const saveDraftRequest = z.strictObject({ act, version, draft: paperworkDraft });
export const saveDraftResponse = z.strictObject({ version, savedAt: z.string() });

export const openDraftResponse = z.strictObject({
  version,
  draft: paperworkDraft,
  savedAt: z.string(),
});

export const handInRequest = z.strictObject({ act, version });
export const handInResponse = z.strictObject({
  number: z.int(),
  hash: z.string(),
  rulesHash: z.string(),
  receivedAt: z.string(),
});

export const decideRequest = z.strictObject({
  act,
  number: z.int().check(z.gte(1)),
  decision: z.enum(['accepted', 'returned'], 'Accept it or return it.'),
  remarks: z
    .array(
      z.strictObject({
        item: z.string().check(z.maxLength(120)),
        text: z.string().check(z.minLength(1), z.maxLength(1_000, 'At most 1,000 characters.')),
      }),
    )
    .check(z.maxLength(100)),
});
export const decideResponse = z.strictObject({ state: z.enum(['accepted', 'returned']) });

const written = z.strictObject({ text: z.string(), unit: z.string() });

export const checkResponse = z.strictObject({
  /** Hash of the rules in force that the draft was held against. */
  rulesHash: z.string(),
  missing: z.string(),
  complete: z.boolean(),
  cells: z.array(z.strictObject({ place: z.string(), detail: z.string() })),
  results: z.array(
    z.looseObject({
      clause: z.string(),
      heading: z.string(),
      state: z.string(),
      pass: z.nullable(z.boolean()),
      advisory: z.boolean(),
      sentence: z.string(),
      cautions: z.array(z.string()),
      perPosition: z.array(
        z.looseObject({
          position: z.string(),
          state: z.string(),
          sentence: z.string(),
          value: z.optional(written),
        }),
      ),
    }),
  ),
});

export type SaveDraftResponse = z.infer<typeof saveDraftResponse>;
export type HandInResponse = z.infer<typeof handInResponse>;
export type CheckResponse = z.infer<typeof checkResponse>;
export type OpenDraftResponse = z.infer<typeof openDraftResponse>;
