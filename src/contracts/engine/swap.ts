import * as z from 'zod/mini';

const id = z.uuid('Send a UUID of your own making (version 7).');
const short = z.string().check(z.maxLength(120, 'At most 120 characters.'));

/** A race-night engine swap. The photograph is announced by its SHA-256; its bytes follow when they can. */
export const swapRequest = z.strictObject({
  act: id,
  id,
  entryId: z.uuid(),
  /** A known engine, or a new one by its name; the rest of it can wait. */
  engine: z.union([
    z.strictObject({ id: z.uuid() }),
    z.strictObject({
      id,
      reference: z
        .string()
        .check(z.minLength(1, 'Name the engine.'), z.maxLength(40, 'At most 40 characters.')),
      blockCasting: short,
    }),
  ]),
  seal: z
    .string()
    .check(z.minLength(1, 'Give the seal’s number.'), z.maxLength(60, 'At most 60 characters.')),
  paperworkId: id,
  photograph: z.strictObject({
    fileId: id,
    sha256: z.string().check(z.regex(/^[0-9a-f]{64}$/, 'The photograph’s hash is missing.')),
  }),
});

export const swapResponse = z.strictObject({
  /** Where the photograph goes, and the rest of the paperwork. */
  paperworkId: z.uuid(),
  dueAt: z.string(),
  /** Whether this car's inspection is opened already: it stays with the engine before. */
  inspected: z.boolean(),
});

export type SwapRequest = z.infer<typeof swapRequest>;
export type SwapResponse = z.infer<typeof swapResponse>;
