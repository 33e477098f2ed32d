import * as z from 'zod/mini';
import { isStrikeReason } from '@/domain/inspection/capture/strike-reasons';
import { parseWritten } from '@/domain/quantity/parse';
import { getQuantityEntry, isQuantityName } from '@/domain/rulebook/quantity-catalogue';
import { readsAs, writtenWith } from '../written';

const id = z.uuid('This is no identifier.');
/** ISO 8601 instant in UTC with milliseconds, by the device's own clock. */
const instant = z.iso.datetime({
  precision: 3,
  error: 'Write the instant in UTC, to the millisecond.',
});
const name = z.string().check(z.maxLength(40));

export const writtenValue = writtenWith('A value is missing.', 60);
const length = writtenValue.check(readsAs('length'));
const temperature = writtenValue.check(readsAs('temperature'));

const temperatures = z.strictObject({
  bore: z.optional(temperature),
  lifter: z.optional(temperature),
  setting: z.optional(temperature),
  gauge: z.optional(temperature),
});

/** A place on the engine; parts that do not apply are empty texts. */
const place = z.strictObject({
  bank: name,
  cylinder: z.string().check(z.regex(/^(\d{1,2})?$/, 'A cylinder is named by its number.')),
  valve: z.enum(['', 'intake', 'exhaust'], 'A valve is intake or exhaust.'),
  index: z.optional(z.int().check(z.gte(1), z.lte(9))),
});

const captured = { id, occurredAt: instant };

export const readingRow = z
  .strictObject({
    kind: z.literal('reading'),
    ...captured,
    quantity: z.string().check(z.refine(isQuantityName, 'This quantity is not known.')),
    place,
    depth: name,
    axis: name,
    repeat: z.int().check(z.gte(1), z.lte(99)),
    set: z.int().check(z.gte(1), z.lte(9)),
    method: z.enum(['absolute', 'comparative']),
    gaugeId: id,
    zeroRunId: z.optional(id),
    value: writtenValue,
    temperatures: z.optional(temperatures),
    /** Named for a part of the reference set. */
    referencePart: z.optional(name.check(z.minLength(1, 'Name the reference part.'))),
  })
  .check((context) => {
    const { quantity, value } = context.value;
    if (!isQuantityName(quantity)) return;
    const read = parseWritten(value, getQuantityEntry(quantity).dimension);
    if (!read.ok)
      context.issues.push({
        code: 'custom',
        input: value,
        path: ['value', 'text'],
        message: read.failure.detail,
      });
  });

export const zeroRow = z.strictObject({
  kind: z.literal('zero'),
  ...captured,
  runId: id,
  end: z.enum(['opening', 'closing']),
  gaugeId: id,
  zeroedOn: z.enum(['lifter', 'ring']),
  ringId: z.optional(id),
  size: z.optional(length),
  reading: length,
});

const remark = { kind: z.literal('remark'), ...captured, place };
const words = z.string().check(z.maxLength(500, 'Write at most 500 characters.'));
const needed = words.check(z.minLength(1, 'Say why.'));
const subject = z.string().check(z.maxLength(120));

export const remarkRow = z.discriminatedUnion('remark', [
  z.strictObject({
    ...remark,
    remark: z.literal('strike'),
    readingId: id,
    reason: z.string().check(z.refine(isStrikeReason, 'Choose a reason from the list.')),
  }),
  z.strictObject({ ...remark, remark: z.literal('move'), readingId: id, reason: words }),
  z.strictObject({ ...remark, remark: z.literal('not-reached'), subject, reason: needed }),
  z.strictObject({
    ...remark,
    remark: z.literal('check'),
    subject: subject.check(z.minLength(1, 'Which check?')),
    value: z.string().check(z.minLength(1, 'An answer is missing.'), z.maxLength(200)),
    reason: words,
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('witness'),
    /** The witness as named by themselves. */
    subject: subject.check(z.minLength(1, 'Name the witness.')),
    value: z.enum(['signed', 'refused'], 'The witness signed or refused.'),
    reason: words,
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('own-reading'),
    /** What was read, a quantity's name; kept beside the sheet and part of no result. */
    subject: subject.check(z.minLength(1, 'Say what was read.')),
    /** As said, with its unit: `0.8423 in`. */
    value: z.string().check(z.minLength(1, 'A value is missing.'), z.maxLength(60)),
    /** Whose reading it is. */
    reason: words.check(z.minLength(1, 'Name whose reading it is.')),
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('photograph'),
    subject,
    /** The kept file's id. */
    value: id,
    reason: words,
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('temperature'),
    subject: z.enum(['bore', 'lifter', 'setting', 'gauge']),
    value: z.string().check(z.minLength(1), z.maxLength(40)),
    reason: words,
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('second-set'),
    /** The number of the set that stands, or both together. */
    value: z.string().check(z.regex(/^([1-9]|pooled)$/, 'Which set stands?')),
    reason: needed,
  }),
  z.strictObject({ ...remark, remark: z.literal('lifter-out'), reason: words }),
  z.strictObject({
    ...remark,
    remark: z.literal('lifter-in'),
    /** The bore that the lifter came out of. */
    subject: subject.check(z.minLength(1, 'Which lifter?')),
    reason: words,
  }),
  z.strictObject({
    ...remark,
    remark: z.literal('lifters-returned'),
    subject: subject.check(z.minLength(1, 'Name who signs for it.')),
    value: z.enum(['kept', 'changed'], 'Was the order kept or changed?'),
    reason: words,
  }),
]);

export const captureRow = z.discriminatedUnion('kind', [readingRow, zeroRow, remarkRow]);

export type SentReading = z.output<typeof readingRow>;
export type SentZero = z.output<typeof zeroRow>;
export type SentRemark = z.output<typeof remarkRow>;
export type SentRow = SentReading | SentZero | SentRemark;
