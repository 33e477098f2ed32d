import * as z from 'zod/mini';
import { findUnit } from '@/domain/quantity/find-unit';
import {
  getQuantityEntry,
  isQuantityName,
  type QuantityName,
} from '@/domain/rulebook/quantity-catalogue';
import { quantityName } from './document';

const line = z.string().check(z.maxLength(200, 'At most 200 characters.'));
const typed = z.string().check(z.maxLength(500, 'At most 500 characters.'));

const place = {
  position: line,
  quantity: quantityName,
  depth: line,
  axis: line,
};

const source = z.strictObject({
  fileId: z.uuid(),
  file: line,
  cell: line,
  held: z.optional(typed),
});

/** A unit that is none of the quantity's would make nonsense of the number. A quantity that is none is refused by itself. */
const fits = ({ quantity, unit }: { quantity: QuantityName; unit: string }): boolean =>
  !isQuantityName(quantity) || findUnit(getQuantityEntry(quantity).dimension, unit) !== undefined;
const UNFIT = { error: 'This is no unit of the quantity.', path: ['unit'] };

const cell = z
  .strictObject({
    ...place,
    typed,
    unit: line,
    source: z.optional(source),
    confirmed: z.optional(z.boolean()),
  })
  .check(z.refine(fits, UNFIT));

export const columnMeaning = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('position') }),
  z.strictObject({ kind: z.literal('cylinder') }),
  z.strictObject({ kind: z.literal('valve') }),
  z.strictObject({ kind: z.literal('not-taken') }),
  z
    .strictObject({
      kind: z.literal('reading'),
      quantity: quantityName,
      unit: line,
      depth: line,
      axis: line,
      valve: z.optional(z.enum(['intake', 'exhaust'])),
    })
    .check(z.refine(fits, UNFIT)),
]);

export const mapping = z.record(line, columnMeaning);

const typedDraft = z.strictObject({
  answers: z
    .array(z.strictObject({ subject: line, position: line, typed, unit: z.optional(line) }))
    .check(z.maxLength(600)),
  sheets: z
    .array(z.strictObject({ subject: line, cells: z.array(cell).check(z.maxLength(2_000)) }))
    .check(z.maxLength(20)),
  // Pages that were open before still send what was said about headings; that is kept by itself now.
  mapping: z.optional(z.unknown()),
  note: z.string().check(z.maxLength(2_000, 'At most 2,000 characters.')),
  replies: z.optional(
    z
      .array(
        z.strictObject({
          item: line,
          text: z.string().check(z.maxLength(1_000, 'At most 1,000 characters.')),
        }),
      )
      .check(z.maxLength(100)),
  ),
});

/** A draft as it is typed: any text may stand in it. */
export const paperworkDraft = z.pipe(
  typedDraft,
  z.transform(({ mapping: _said, ...draft }) => draft),
);
