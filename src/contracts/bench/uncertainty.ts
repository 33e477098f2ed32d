import * as z from 'zod/mini';
import { degreesOfFreedom, figure, level, unitName } from './text';

export const uncertaintyRequest = z.strictObject({
  /** Of the result. */
  unit: unitName,
  components: z
    .array(
      z.strictObject({
        name: z.string().check(z.minLength(1), z.maxLength(120)),
        standardUncertainty: figure,
        /** Takes the component's unit to the result's; 1 unless stated. */
        sensitivity: z.optional(figure),
        degreesOfFreedom: z.optional(degreesOfFreedom),
      }),
    )
    .check(z.minLength(1), z.maxLength(100)),
  level: z.optional(level),
});

export const uncertaintyResponse = z.strictObject({
  unit: z.string(),
  combined: z.number(),
  effectiveDegreesOfFreedom: z.nullable(z.number()),
  coverageFactor: z.number(),
  expanded: z.number(),
  distribution: z.enum(['normal', 't']),
  /** Part of the variance, 0 to 1, the largest first. */
  shares: z.array(z.strictObject({ name: z.string(), share: z.number(), sentence: z.string() })),
});

export type UncertaintyRequest = z.infer<typeof uncertaintyRequest>;
export type UncertaintyResponse = z.infer<typeof uncertaintyResponse>;
