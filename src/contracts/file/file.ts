import * as z from 'zod/mini';

const act = z.uuid('Send a UUID of your own making (version 7).');

export const expectUploadRequest = z.strictObject({
  act,
  fileId: z.uuid('Send a UUID of your own making (version 7).'),
  purpose: z.enum(['photograph', 'sheet'], 'A photograph or a sheet.'),
  /** The photograph's or sheet's subject in the rulebook. */
  item: z.string().check(z.minLength(1), z.maxLength(120)),
  name: z.string().check(z.minLength(1), z.maxLength(200, 'At most 200 characters.')),
  type: z.string().check(z.maxLength(120)),
  bytes: z.int().check(z.gte(1, 'The file is empty.')),
});
/**
 * Where the bytes go, within minutes: one PUT with this type; or, where parts are given, one PUT for
 * each of them in order, whose answers' ETags come back with the confirmation.
 */
export const expectUploadResponse = z.strictObject({
  fileId: z.uuid(),
  url: z.string(),
  type: z.string(),
  parts: z.optional(z.array(z.strictObject({ url: z.string(), bytes: z.int() }))),
});

export const confirmUploadRequest = z.strictObject({
  act,
  parts: z.optional(
    z
      .array(
        z.strictObject({
          number: z.int().check(z.gte(1)),
          tag: z.string().check(z.maxLength(200)),
        }),
      )
      .check(z.maxLength(100)),
  ),
});

export const fileActRequest = z.strictObject({ act });

export const keptFile = z.strictObject({
  fileId: z.uuid(),
  state: z.enum(['kept', 'refused']),
  sha256: z.optional(z.string()),
  bytes: z.optional(z.int()),
  type: z.optional(z.string()),
  refusedBecause: z.optional(z.string()),
  keptAt: z.optional(z.string()),
});

export type KeptFileAnswer = z.infer<typeof keptFile>;
export type ExpectUploadResponse = z.infer<typeof expectUploadResponse>;
