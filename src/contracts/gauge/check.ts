import * as z from 'zod/mini';
import { readsAs, writtenWith } from '../written';

const length = writtenWith('A figure is missing.', 40).check(readsAs('length'));
const act = z.uuid('The act needs its identifier.');
const instant = z.iso.datetime({ error: 'Write the instant in UTC.' });

/** A gauge read on a ring of the series, or at its own zero, and what it ought to have shown. */
export const gaugeCheckRequest = z.strictObject({
  act,
  id: z.uuid('This is no identifier.'),
  gaugeId: z.uuid('Choose the gauge.'),
  kind: z.enum(['ring', 'zero'], 'A check is on a ring or at the zero.'),
  ringId: z.nullable(z.uuid('Choose the ring.')),
  eventId: z.nullable(z.uuid('Choose the event.')),
  inspectionId: z.nullable(z.uuid('This is no inspection.')),
  readings: z
    .array(length)
    .check(z.minLength(1, 'Write what the gauge read.'), z.maxLength(9, 'At most nine readings.')),
  expected: length,
  allowed: length,
  /** Who of the competitor’s side saw it; empty for a check without them. */
  witness: z.string().check(z.maxLength(120, 'At most 120 characters.')),
  note: z.string().check(z.maxLength(500, 'At most 500 characters.')),
  checkedAt: instant,
});

export const gaugeCheckAnswer = z.strictObject({
  id: z.string(),
  difference: length,
  good: z.boolean(),
});

export const gaugeFaultRequest = z.strictObject({
  act,
  id: z.uuid('This is no identifier.'),
  gaugeId: z.uuid('Choose the gauge.'),
  foundAt: instant,
  /** By how much it was off, as far as known. */
  off: z.nullable(length),
  reason: z
    .string()
    .check(
      z.minLength(1, 'Say what was found, and how.'),
      z.maxLength(2000, 'At most 2,000 characters.'),
    ),
});

export const gaugeFaultAnswer = z.strictObject({
  id: z.string(),
  /** How many verdicts are under review for it. */
  reviews: z.int(),
});

export const reviewRequest = z.strictObject({
  act,
  to: z.enum(['made-public', 'stands', 'decide-again'], 'This cannot be asked for.'),
  reason: z.string().check(z.maxLength(2000, 'At most 2,000 characters.')),
});

export const reviewAnswer = z.strictObject({ reviewId: z.string() });

export type GaugeCheckRequest = z.output<typeof gaugeCheckRequest>;
export type GaugeFaultRequest = z.output<typeof gaugeFaultRequest>;
export type ReviewRequest = z.output<typeof reviewRequest>;
