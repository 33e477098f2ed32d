import * as z from 'zod/mini';
import { quantityName } from '../paperwork/document';
import { columnMeaning, mapping } from '../paperwork/draft';

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
/** Where the bytes go: one PUT with this type, within minutes. */
export const expectUploadResponse = z.strictObject({
  fileId: z.uuid(),
  url: z.string(),
  type: z.string(),
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

export const readSheetRequest = z.strictObject({
  /** The sheet's subject in the rulebook. */
  subject: z.string().check(z.maxLength(120)),
  mapping: z.optional(mapping),
});

export const readSheetResponse = z.strictObject({
  columns: z.array(z.strictObject({ at: z.int(), header: z.string(), meaning: columnMeaning })),
  cells: z.array(
    z.strictObject({
      position: z.string(),
      quantity: quantityName,
      depth: z.string(),
      axis: z.string(),
      typed: z.string(),
      unit: z.string(),
      source: z.optional(
        z.strictObject({ fileId: z.string(), file: z.string(), cell: z.string() }),
      ),
    }),
  ),
  notes: z.array(z.strictObject({ where: z.string(), detail: z.string() })),
});

export type KeptFileAnswer = z.infer<typeof keptFile>;
export type ExpectUploadResponse = z.infer<typeof expectUploadResponse>;
