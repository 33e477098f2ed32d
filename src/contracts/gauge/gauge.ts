import * as z from 'zod/mini';
import { GAUGE_KINDS } from '@/domain/measurement/gauge';
import { dimensionsOf } from '@/domain/quantity/find-unit';
import { parseWritten } from '@/domain/quantity/parse';
import { writtenWith } from '../written';

const figure = writtenWith('A figure is missing.', 40).check((context) => {
  const [dimension] = dimensionsOf(context.value.unit);
  const read = dimension && parseWritten(context.value, dimension);
  const message =
    read === undefined
      ? `"${context.value.unit}" is no unit known here.`
      : read.ok
        ? undefined
        : read.failure.detail;
  if (message !== undefined)
    context.issues.push({ code: 'custom', input: context.value, path: ['text'], message });
});

const day = z.iso.date('Write the day as 2026-03-02.');
const decimal = z.string().check(z.regex(/^\d{1,4}(\.\d{1,4})?$/, 'Write a number such as 2.'));

/** A gauge's figures as the register keeps them. */
export const gaugeDescription = z
  .strictObject({
    kind: z.enum(GAUGE_KINDS, 'Choose a kind of gauge.'),
    name: z.string().check(z.maxLength(120)),
    division: z.optional(figure),
    range: z.optional(z.strictObject({ from: figure, to: figure })),
    largerReads: z.optional(z.enum(['plus', 'minus'], 'A larger bore reads plus or minus.')),
    /** Of a setting ring: its certified size. */
    size: z.optional(figure),
    certificate: z.optional(
      z.strictObject({
        number: z.string().check(z.maxLength(60)),
        expandedUncertainty: figure,
        coverageFactor: decimal,
        degreesOfFreedom: z.optional(decimal),
      }),
    ),
    /** The kept file of the certificate. */
    certificateFile: z.optional(z.uuid('This is no file.')),
    calibratedOn: z.optional(day),
    dueOn: z.optional(day),
  })
  .check((context) => {
    const { kind, size, largerReads, calibratedOn, dueOn } = context.value;
    const say = (path: string, message: string) =>
      context.issues.push({ code: 'custom', input: context.value, path: [path], message });
    if (kind === 'setting-ring' && size === undefined)
      say('size', 'A setting ring has its certified size.');
    if (kind === 'dial-bore-gauge' && largerReads === undefined)
      say('largerReads', 'Say which way the pointer goes in a larger bore; check it by thumb.');
    if (calibratedOn !== undefined && dueOn !== undefined && dueOn < calibratedOn)
      say('dueOn', 'The due day lies before the calibration.');
  });

export const gaugeRequest = z.strictObject({
  act: z.uuid('The act needs its identifier.'),
  /** Made by the client for a new gauge. */
  id: z.uuid('This is no identifier.'),
  code: z
    .string()
    .check(z.minLength(1, 'A gauge has its code.'), z.maxLength(24, 'At most 24 characters.')),
  description: gaugeDescription,
  status: z.enum(['in-use', 'withdrawn'], 'A gauge is in use or withdrawn.'),
  /** Of the gauge as it was opened; 0 for a new one. */
  version: z.int(),
});

export const gaugeAnswer = z.strictObject({ id: z.string(), version: z.int() });

export type GaugeDescription = z.output<typeof gaugeDescription>;
export type GaugeRequest = z.output<typeof gaugeRequest>;
