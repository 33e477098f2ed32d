import * as z from 'zod/mini';
import { clause, clauses, penalties } from './clause';
import { clauseNumber, instant, key, long, short, whole } from './text';

/** What an official writes, and what import and export carry: a rulebook without its dates. */
export const rulebookContent = z.strictObject({ clauses, penalties });

/** A rulebook as a file. */
export const rulebookFile = z.strictObject({
  format: z.literal('tagwire/rulebook'),
  version: z.literal('1'),
  title: short,
  ...rulebookContent.shape,
});

export const edition = z.strictObject({
  id: key,
  className: short,
  season: short,
  number: whole,
  clauses,
  penalties,
  inForceAt: instant,
});

const changeNumber = { number: clauseNumber };

export const clauseChange = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('add'), clause }),
  z.strictObject({ kind: z.literal('replace'), clause }),
  z.strictObject({ kind: z.literal('withdraw'), ...changeNumber }),
]);

export const effective = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('next-event') }),
  z.strictObject({ kind: z.literal('instant'), at: instant }),
  z.strictObject({ kind: z.literal('safety') }),
]);

/** What an official writes of a bulletin; number and publication come with publishing. */
export const bulletinContent = z.strictObject({
  title: short,
  reason: long,
  changes: z.array(clauseChange).check(z.maxLength(200)),
  effective,
});

export const bulletin = z.strictObject({
  ...bulletinContent.shape,
  id: key,
  number: whole,
  season: short,
  edition: whole,
  publishedAt: instant,
});

export const clarification = z.strictObject({
  id: key,
  number: whole,
  season: short,
  clause: clauseNumber,
  question: long,
  answer: long,
  publishedAt: instant,
});

export const withdrawal = z.strictObject({
  id: key,
  number: whole,
  season: short,
  clarification: whole,
  clause: clauseNumber,
  reason: long,
  publishedAt: instant,
});

export const waiver = z.strictObject({
  id: key,
  number: whole,
  season: short,
  clause: clauseNumber,
  for: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('car'), carNumber: key }),
    z.strictObject({ kind: z.literal('engine'), engineId: key, engineName: short }),
  ]),
  words: long,
  reason: long,
  fromAt: instant,
  untilAt: instant,
});
