import * as z from 'zod/mini';
import { figure, level } from './text';

/** The largest published certified set has 18,009 values. */
const LARGEST_STUDY = 20_000;

const series = z.array(figure).check(z.maxLength(LARGEST_STUDY));
const rows = z.array(series).check(z.maxLength(1_000));
/** Appraiser × trial × part, no gaps. */
const crossed = z.array(rows).check(z.minLength(2), z.maxLength(20));
const pairs = z.array(figure).check(z.minLength(2), z.maxLength(LARGEST_STUDY));
const whole = z.int().check(z.gte(0), z.lte(1_000_000_000));

/** The bare list may stand in place of the object that names it. */
const named = <Key extends string, Shape extends z.ZodMiniType>(key: Key, shape: Shape) =>
  z.union([z.strictObject({ [key]: shape } as { [K in Key]: Shape }), shape]);

export const studyRequest = z.discriminatedUnion('method', [
  z.strictObject({
    method: z.literal('summary'),
    data: named('values', series.check(z.minLength(2))),
  }),
  z.strictObject({
    method: z.literal('one-way'),
    data: named('groups', rows.check(z.minLength(2))),
  }),
  z.strictObject({ method: z.literal('average-range'), data: named('data', crossed) }),
  z.strictObject({ method: z.literal('anova'), data: named('data', crossed) }),
  z.strictObject({ method: z.literal('iso5725'), data: named('data', rows.check(z.minLength(2))) }),
  z.strictObject({
    method: z.literal('bland-altman'),
    /** Limits of agreement at bias ∓ multiplier × sd; 1.96 unless stated. */
    data: z.strictObject({
      a: pairs,
      b: pairs,
      multiplier: z.optional(z.number().check(z.positive())),
    }),
  }),
  z.strictObject({
    method: z.literal('kappa'),
    data: named(
      'table',
      z.array(z.array(whole).check(z.maxLength(50))).check(z.minLength(2), z.maxLength(50)),
    ),
  }),
  z.strictObject({
    method: z.literal('wilson'),
    data: z.strictObject({
      count: whole,
      n: whole.check(z.gte(1)),
      level: z.optional(level),
    }),
  }),
]);

const gaugeStudy = {
  method: z.enum(['average-range', 'anova']),
  EV: z.number(),
  AV: z.number(),
  GRR: z.number(),
  PV: z.number(),
  TV: z.number(),
  ndc: z.nullable(z.number()),
  /** Analysis of variance: whether the interaction was pooled with the repeatability. */
  pooled: z.optional(z.boolean()),
};

export const studyResponse = z.union([
  z.strictObject({
    mean: z.number(),
    standardDeviation: z.number(),
    lag1: z.nullable(z.number()),
    n: z.number(),
  }),
  z.strictObject({
    ssBetween: z.number(),
    ssWithin: z.number(),
    F: z.nullable(z.number()),
    p: z.nullable(z.number()),
    dfBetween: z.number(),
    dfWithin: z.number(),
  }),
  z.strictObject(gaugeStudy),
  z.strictObject({
    mean: z.number(),
    repeatabilitySd: z.number(),
    reproducibilitySd: z.number(),
    repeatabilityLimit: z.number(),
    reproducibilityLimit: z.number(),
  }),
  z.strictObject({
    bias: z.number(),
    sd: z.number(),
    lower: z.number(),
    upper: z.number(),
    multiplier: z.number(),
  }),
  z.strictObject({ kappa: z.nullable(z.number()) }),
  z.strictObject({ lower: z.number(), upper: z.number() }),
]);

export type StudyRequest = z.infer<typeof studyRequest>;
export type StudyResponse = z.infer<typeof studyResponse>;
