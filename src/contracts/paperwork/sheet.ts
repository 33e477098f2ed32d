import * as z from 'zod/mini';
import { quantityName } from './document';
import { columnMeaning, mapping } from './draft';

const subject = z.string().check(z.maxLength(120));

export const readSheetRequest = z.strictObject({
  /** The sheet's subject in the rulebook. */
  subject,
  /** What the person said about columns just now; it goes before what is remembered. */
  mapping: z.optional(mapping),
});

export const readSheetResponse = z.strictObject({
  columns: z.array(
    z.strictObject({
      at: z.int(),
      header: z.string(),
      key: z.string(),
      meaning: columnMeaning,
      chosen: z.boolean(),
      hidden: z.boolean(),
      samples: z.array(z.string()),
    }),
  ),
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
  notes: z.array(
    z.strictObject({ where: z.string(), detail: z.string(), row: z.optional(z.int()) }),
  ),
  headingRow: z.int(),
  turned: z.boolean(),
  sheet: z.string(),
});

export type ReadSheetAnswer = z.infer<typeof readSheetResponse>;

export const rememberColumnsRequest = z.strictObject({
  act: z.uuid('Send a UUID of your own making (version 7).'),
  subject,
  mapping,
});
export const rememberColumnsResponse = z.strictObject({ remembered: z.int() });
