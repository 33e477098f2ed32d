import * as z from 'zod/mini';
import { degreesOfFreedom, figure, level, measuredText, unitName } from './text';

/** Give the guard band by a factor of U or by a one-sided probability (0.95 unless stated), never both. */
const decisionRule = z.strictObject({
  kind: z.enum([
    'simple',
    'guarded-acceptance',
    'guarded-rejection',
    'conformance-probability',
    'iso14253',
    'ilac-g8-four',
  ]),
  guardFactor: z.optional(figure),
  probability: z.optional(z.number()),
});

export const assessRequest = z.strictObject({
  requirement: z.strictObject({
    unit: unitName,
    min: z.optional(measuredText),
    max: z.optional(measuredText),
    decisionRule,
    /** ASTM E29: the value as it is, or rounded to `decimals` of the limit's unit first. */
    comparison: z.optional(z.enum(['absolute', 'rounded'])),
    decimals: z.optional(z.int().check(z.gte(-6), z.lte(12))),
    /** The smallest allowed window ÷ 2U; 2 unless stated. */
    fitRatio: z.optional(figure),
    /** The largest allowed U, in the requirement's unit. */
    maximumUncertainty: z.optional(figure),
  }),
  value: measuredText,
  unit: unitName,
  /** In `unit`. */
  standardUncertainty: figure,
  degreesOfFreedom: z.optional(degreesOfFreedom),
  level: z.optional(level),
});

export const assessResponse = z.strictObject({
  assessment: z.enum(['within', 'outside', 'too-close']),
  fit: z.boolean(),
  complies: z.nullable(z.boolean()),
  conformanceProbability: z.number(),
  coverageFactor: z.number(),
  /** In `unit`. */
  expandedUncertainty: z.number(),
  /** In the requirement's unit. */
  acceptance: z.nullable(
    z.strictObject({ min: z.optional(z.string()), max: z.optional(z.string()) }),
  ),
  fourState: z.enum(['pass', 'conditional-pass', 'conditional-fail', 'fail']),
  ratio: z.nullable(z.number()),
  distribution: z.enum(['normal', 't']),
  sentence: z.string(),
});

export type AssessRequest = z.infer<typeof assessRequest>;
export type AssessResponse = z.infer<typeof assessResponse>;
