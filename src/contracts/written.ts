import * as z from 'zod/mini';
import type { Dimension, Written } from '@/domain/quantity/dimension';
import { parseWritten } from '@/domain/quantity/parse';

/** A number as it is written, with its unit. `missing` is said where there is none. */
export const writtenWith = (missing: string, most: number) =>
  z.strictObject({
    text: z.string().check(z.minLength(1, missing), z.maxLength(most)),
    unit: z.string().check(z.minLength(1, 'A unit is missing.'), z.maxLength(20)),
  });

/** A check of it: it reads as a number of this dimension, or the fault stands at its text. */
export const readsAs =
  (dimension: Dimension) =>
  (context: z.core.ParsePayload<Written>): void => {
    const read = parseWritten(context.value, dimension);
    if (!read.ok)
      context.issues.push({
        code: 'custom',
        input: context.value,
        path: ['text'],
        message: read.failure.detail,
      });
  };
