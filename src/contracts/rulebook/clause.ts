import * as z from 'zod/mini';
import { limitRequirement, per, referenceAverageRequirement } from './limit';
import { clauseNumber, key, long, short, whole, written } from './text';

export const requirement = z.discriminatedUnion('kind', [
  limitRequirement,
  referenceAverageRequirement,
  z.strictObject({
    kind: z.literal('choice'),
    subject: key,
    question: short,
    options: z.array(z.strictObject({ value: key, label: short })).check(z.maxLength(40)),
    allowed: z.array(key).check(z.maxLength(40)),
    per,
  }),
  z.strictObject({
    kind: z.literal('yes-no'),
    subject: key,
    question: short,
    required: z.enum(['yes', 'no']),
    per,
  }),
  z.strictObject({ kind: z.literal('matches-paperwork'), subject: key, question: short, per }),
  z.strictObject({
    kind: z.literal('plug-gauge'),
    subject: key,
    size: written,
    gauge: z.enum(['go', 'no-go']),
    where: short,
    per,
  }),
  z.strictObject({
    kind: z.literal('photograph'),
    subject: key,
    visible: z.array(short).check(z.maxLength(20)),
  }),
  z.strictObject({
    kind: z.literal('sheet'),
    subject: key,
    sheet: z.enum(['lifters', 'engine', 'camshaft', 'lift-table', 'weights', 'other']),
    title: short,
  }),
  z.strictObject({ kind: z.literal('seal'), subject: key, place: short, count: whole }),
]);

/** A clause as drafted, imported, exported and stored; `number` and kinds must be sound, words may be blank. */
export const clause = z.strictObject({
  number: clauseNumber,
  heading: short,
  words: long,
  force: z.enum(['mandatory', 'advisory', 'judged', 'text']),
  requirement: z.optional(requirement),
  definitions: z.optional(
    z.array(z.strictObject({ term: short, meaning: long })).check(z.maxLength(200)),
  ),
  refs: z.optional(z.array(clauseNumber).check(z.maxLength(60))),
  penaltyRow: z.optional(key),
});

export const clauses = z.array(clause).check(z.maxLength(1000));

export const penaltyRow = z.strictObject({
  row: key,
  breach: short,
  penalties: z.array(short).check(z.maxLength(12)),
  carriesOver: z.boolean(),
});

export const penalties = z.array(penaltyRow).check(z.maxLength(100));
