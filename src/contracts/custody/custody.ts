import * as z from 'zod/mini';

const act = z.uuid('The act needs its identifier.');
const id = z.uuid('This is no identifier.');
const name = (missing: string) =>
  z.string().check(z.trim(), z.minLength(1, missing), z.maxLength(120, 'At most 120 characters.'));
const some = (most: number) =>
  z.string().check(z.trim(), z.maxLength(most, `At most ${most} characters.`));
const instant = z.iso.datetime({ error: 'Write the instant in UTC.' });

/** A part is taken into custody under a new tag. */
export const heldPartRequest = z.strictObject({
  act,
  id,
  kind: z.enum(['held', 'sample', 'reference'], 'Choose what it is.'),
  inspectionId: id,
  words: z
    .string()
    .check(
      z.trim(),
      z.minLength(1, 'Say which part it is.'),
      z.maxLength(200, 'At most 200 characters.'),
    ),
  placeOnEngine: some(120),
  /** The clause that relies on it; empty where none does. */
  clause: some(40),
  bag: some(40),
  takenFrom: name('Say from whom it was taken.'),
  takenBy: name('Say who took it.'),
  place: some(120),
  takenAt: instant,
  /** Not given back before; `null`: until the appeal’s time is over. */
  holdUntil: z.nullable(instant),
});

const onPart = { act, id, partId: id, place: some(120), occurredAt: instant };

/** What happens to a held part, each with who gives, who receives, when and why. */
export const custodyRequest = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('hand-over'),
    ...onPart,
    giver: name('Say who gives it.'),
    receiver: name('Say who receives it.'),
    reason: some(500).check(z.minLength(1, 'Say why it changes hands.')),
  }),
  z.strictObject({
    kind: z.literal('bag-opened'),
    ...onPart,
    giver: name('Say who opened it.'),
    /** Empty: nobody saw it, and the history shows a gap. */
    witness: some(120),
    bag: some(40),
    reason: some(500).check(z.minLength(1, 'Say why it was opened.')),
  }),
  z.strictObject({
    kind: z.literal('bag-closed'),
    ...onPart,
    giver: name('Say who closed it.'),
    bag: some(40).check(z.minLength(1, 'Write the bag’s number.')),
    reason: some(500),
  }),
  z.strictObject({
    kind: z.literal('returned'),
    ...onPart,
    giver: name('Say who gives it back.'),
    receiver: name('Say who takes it back.'),
    reason: some(500),
  }),
]);

/** A seal of an engine, as it was applied, found or removed. */
export const sealRequest = z
  .strictObject({
    act,
    id,
    inspectionId: id,
    kind: z.enum(['applied', 'found', 'removed'], 'Was it applied, found or removed?'),
    number: some(40),
    place: name('Say where the seal sits.'),
    /** How it was found; `null` for the others. */
    state: z.nullable(z.enum(['intact', 'broken', 'missing', 'other-number'])),
    doneBy: name('Say who did it.'),
    note: some(500),
    occurredAt: instant,
  })
  .check((context) => {
    const { kind, state, number } = context.value;
    const say = (path: string, message: string) =>
      context.issues.push({ code: 'custom', input: context.value, path: [path], message });
    if (kind === 'found' && state === null) say('state', 'Say how the seal was found.');
    if (kind !== 'found' && state !== null) say('state', 'Only a seal that was found has a state.');
    if (number === '' && state !== 'missing') say('number', 'Write the seal’s number.');
  });

export const custodyAnswer = z.strictObject({ id: z.string() });
export const tagAnswer = z.strictObject({ id: z.string(), tag: z.string() });

export type HeldPartRequest = z.output<typeof heldPartRequest>;
export type CustodyRequest = z.output<typeof custodyRequest>;
export type SealRequest = z.output<typeof sealRequest>;
