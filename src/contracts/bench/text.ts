import * as z from 'zod/mini';

/** A measured value travels as the text that was written: `"0.8440"` keeps what the gauge resolves. */
export const measuredText = z.string().check(z.minLength(1), z.maxLength(60));

/** The symbol or name of a unit: `in`, `mm`, `cc`, `lbf`, `deg`, `°F`. */
export const unitName = z.string().check(z.minLength(1), z.maxLength(20));

/** A figure that is computed or counted: a JSON number, or the same as text. */
export const figure = z.union([z.number(), measuredText]);

/** Degrees of freedom: above zero; null means known well enough to be taken as infinite. */
export const degreesOfFreedom = z.nullable(z.number().check(z.positive()));

/** A two-sided coverage probability, such as 0.95. */
export const level = z.number().check(z.gt(0), z.lt(1));
