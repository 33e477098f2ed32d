import * as z from 'zod/mini';
import { QUANTITY_NAMES } from '@/domain/rulebook/quantity-catalogue';
import { probability, short, whole, written } from './text';

const guard = {
  guardFactor: z.optional(z.string().check(z.maxLength(20))),
  probability: z.optional(probability),
};

export const decisionRule = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('simple') }),
  z.strictObject({ kind: z.literal('guarded-acceptance'), ...guard }),
  z.strictObject({ kind: z.literal('guarded-rejection'), ...guard }),
  z.strictObject({ kind: z.literal('iso14253') }),
  z.strictObject({ kind: z.literal('conformance-probability'), probability }),
  z.strictObject({ kind: z.literal('ilac-g8-four') }),
]);

const comparison = z.discriminatedUnion('method', [
  z.strictObject({ method: z.literal('absolute') }),
  z.strictObject({ method: z.literal('rounded'), decimals: whole }),
]);

export const per = z.enum(['bore', 'lifter', 'cylinder', 'engine', 'car']);

const measurand = {
  quantity: z.enum(QUANTITY_NAMES),
  unit: z.string().check(z.maxLength(20)),
  per,
  figure: z.optional(z.enum(['mean', 'smallest', 'largest'])),
  datum: z.optional(short),
  lash: z.optional(written),
  checkingLifter: z.optional(z.enum(['solid', 'as-fitted'])),
};

const held = {
  decisionRule,
  comparison,
  fitRatio: z.optional(z.string().check(z.maxLength(20))),
  maximumUncertainty: z.optional(written),
  ringCheck: z.optional(written),
};

/** A limit on a measured or derived quantity: `min`, `max` or both, or a nominal with its tolerance. */
export const limitRequirement = z.strictObject({
  kind: z.literal('limit'),
  ...measurand,
  ...held,
  min: z.optional(written),
  max: z.optional(written),
  nominal: z.optional(z.strictObject({ size: written, plus: written, minus: written })),
  sample: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('all') }),
    z.strictObject({ kind: z.literal('some'), count: whole }),
  ]),
  rounding: z.optional(
    z.strictObject({
      of: z.enum(['limit', 'measured']),
      direction: z.enum(['up', 'down', 'nearest']),
      step: written,
    }),
  ),
  twoSets: z.optional(z.enum(['each'])),
});

export const referenceAverageRequirement = z.strictObject({
  kind: z.literal('reference-average'),
  ...measurand,
  ...held,
  n: whole,
  plus: written,
  minus: written,
});
