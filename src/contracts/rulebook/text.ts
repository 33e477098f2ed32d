import * as z from 'zod/mini';
import { isClauseNumber } from '@/domain/rulebook/clause';

/** Blank text passes here: a draft may be unfinished. What may be published is the domain's to say. */
export const short = z.string().check(z.maxLength(200));
export const long = z.string().check(z.maxLength(20_000));

/** Small letters, digits and hyphens: `tappet-type`. */
export const key = z.string().check(z.maxLength(60));

export const clauseNumber = z
  .string()
  .check(z.maxLength(40), z.refine(isClauseNumber, 'A clause number reads like 7.4.3.'));

/** A number as JSON, or as text: canonical documents hold no JSON numbers. */
export const whole = z.pipe(
  z.union([z.int(), z.string().check(z.regex(/^-?\d{1,9}$/))]),
  z.transform(Number),
);

export const probability = z.pipe(
  z.union([z.number(), z.string().check(z.regex(/^0?\.\d{1,17}$/))]),
  z.transform(Number),
);

/** ISO 8601 instant in UTC with milliseconds, as `Date.toISOString` writes it. */
export const instant = z.iso.datetime({ precision: 3 });

export const written = z.strictObject({
  text: z.string().check(z.maxLength(60)),
  unit: z.string().check(z.maxLength(20)),
});
