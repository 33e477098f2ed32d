import * as z from 'zod/mini';

const id = z.uuid('This is no identifier.');
const text = (most: number) => z.string().check(z.maxLength(most, `At most ${most} characters.`));

export const checkRequest = z.strictObject({
  act: z.uuid('The act needs its identifier.'),
  id,
  entryId: id,
  clause: text(20).check(z.minLength(1, 'Name the clause.')),
  /** One of the check's answers; left out where a value is read. */
  answer: z.optional(text(60)),
  value: z.optional(z.strictObject({ text: text(30), unit: text(12) })),
  gaugeId: z.optional(z.uuid('Choose the gauge.')),
  /** Takes back what was entered last for this car and clause, with the reason. */
  takeBack: z.optional(text(300)),
  /** What was read last stands, under `gaugeId` instead: why the gauge is corrected. */
  correction: z.optional(text(300)),
});

export const checkAnswer = z.strictObject({
  state: z.enum(['within', 'outside', 'no-statement', 'taken-back']),
  sentence: z.string(),
  /** The inspection that a failed check opened, or that was open before. */
  inspection: z.nullable(z.string()),
});

export const lineCheckShown = z.strictObject({
  classId: z.string(),
  clause: z.string(),
  heading: z.string(),
  words: z.string(),
  advisory: z.boolean(),
  usual: z.boolean(),
  ask: z.discriminatedUnion('kind', [
    z.strictObject({
      kind: z.literal('answer'),
      answers: z.array(z.strictObject({ value: z.string(), label: z.string() })),
    }),
    z.strictObject({ kind: z.literal('value'), unit: z.string() }),
  ]),
});

export const checkedShown = z.strictObject({
  id: z.string(),
  entryId: z.string(),
  clause: z.string(),
  answer: z.string(),
  value: z.nullable(z.strictObject({ text: z.string(), unit: z.string() })),
  gauge: z.nullable(z.string()),
  /** Why its gauge was corrected; empty where it was not. */
  correctedBecause: z.string(),
  state: z.enum(['within', 'outside', 'no-statement']),
  sentence: z.string(),
  by: z.string(),
  at: z.string(),
});

/** Everything the page of an event's checks shows. */
export const checksShown = z.strictObject({
  seriesId: z.string(),
  eventId: z.string(),
  zone: z.string(),
  records: z.boolean(),
  checks: z.array(lineCheckShown),
  cars: z.array(
    z.strictObject({
      entryId: z.string(),
      classId: z.string(),
      className: z.string(),
      carNumber: z.string(),
      inspectionId: z.nullable(z.string()),
    }),
  ),
  /** The last one of each car and clause that was not taken back. */
  checked: z.array(checkedShown),
  gauges: z.array(z.strictObject({ id: z.string(), code: z.string(), name: z.string() })),
  /** Counts every check ever entered: what is signed is what was read. */
  mark: z.string(),
});

export type CheckRequest = z.output<typeof checkRequest>;
export type CheckAnswer = z.output<typeof checkAnswer>;
export type ChecksShown = z.output<typeof checksShown>;
export type LineCheckShown = z.output<typeof lineCheckShown>;
export type CheckedShown = z.output<typeof checkedShown>;
