import * as z from 'zod/mini';
import { isValueNumber } from '@/domain/draw/values';
import { lineProofShape } from '@/domain/ledger/verify/line-proof';

const act = z.uuid('The act needs its identifier.');
const id = z.uuid('This is no identifier.');
const hash = z.string().check(z.regex(/^[0-9a-f]{64}$/, 'This is no SHA-256 in hex.'));

/** A public value to come; empty `substitute` unless it is to be used. */
export const announcedValue = z
  .strictObject({
    name: z
      .string()
      .check(
        z.trim(),
        z.minLength(1, 'Say what the value is and who reads it out.'),
        z.maxLength(300, 'At most 300 characters.'),
      ),
    ifMissing: z.enum(
      ['left-out', 'substitute', 'void'],
      'Say what happens if it does not come about.',
    ),
    substitute: z.string().check(z.trim(), z.maxLength(300, 'At most 300 characters.')),
  })
  .check((context) => {
    const { ifMissing, substitute } = context.value;
    if ((ifMissing === 'substitute') === (substitute !== '')) return;
    context.issues.push({
      code: 'custom',
      input: substitute,
      path: ['substitute'],
      message:
        substitute === ''
          ? 'Name the value that takes its place.'
          : 'A substitute is named, but not used. Choose it, or leave it out.',
    });
  });

export const announceRequest = z
  .strictObject({
    act,
    /** Id of the draw. */
    id,
    eventId: id,
    classId: id,
    /** SHA-256 of the pool as it was shown: what changed meanwhile is seen first. */
    poolHash: hash,
    select: z.int('Write a whole number.').check(z.gte(1, 'Draw at least one car.'), z.lte(999)),
    sessionAt: z.iso.datetime('Write the day and time at which the session begins.'),
    values: z
      .array(announcedValue)
      .check(z.minLength(1, 'Name at least one value to come.'), z.maxLength(20, 'At most 20.')),
  })
  .check((context) => {
    const names = context.value.values.map(({ name }) => name);
    for (const [at, name] of names.entries()) {
      if (names.indexOf(name) === at) continue;
      context.issues.push({
        code: 'custom',
        input: name,
        path: ['values', at, 'name'],
        message: 'This value stands twice.',
      });
    }
  });

export const valuesRequest = z.strictObject({
  act,
  /** In the order announced. */
  values: z
    .array(
      z.strictObject({
        name: z.string().check(z.minLength(1), z.maxLength(400)),
        source: z.enum(['announced', 'substitute', 'missing'], 'Say which value this is.'),
        numbers: z
          .array(
            z.string().check(
              z.refine(isValueNumber, {
                error: ({ input }) =>
                  `“${input}” is no whole number. Put spaces between numbers; 21.417 s is 21417.`,
              }),
            ),
          )
          .check(z.maxLength(200, 'At most 200 numbers.')),
      }),
    )
    .check(z.minLength(1), z.maxLength(20)),
});

export const voidRequest = z.strictObject({
  act,
  reason: z
    .string()
    .check(
      z.trim(),
      z.minLength(1, 'Say why the draw cannot count; everybody will read it.'),
      z.maxLength(400, 'At most 400 characters.'),
    ),
});

export const pickDrawnRequest = z.strictObject({
  act,
  /** Ids for the inspections, in the order drawn. */
  inspectionIds: z.array(id).check(z.minLength(1), z.maxLength(999)),
});

/** What became of a drawn car. */
export const drawnCar = z.strictObject({
  car: z.string(),
  state: z.enum(['picked', 'picked-before', 'withdrawn', 'to-pick']),
  inspectionId: z.nullable(z.string()),
});

export const announcedAnswer = z.strictObject({ id: z.string(), document: z.string() });
export const madeAnswer = z.strictObject({ document: z.string(), cars: z.array(z.string()) });
export const voidAnswer = z.strictObject({ document: z.string() });
export const pickedAnswer = z.strictObject({ cars: z.array(drawnCar) });

const logged = {
  /** The exact canonical text, and the salt its line commits to it with. */
  document: z.string(),
  salt: z.string(),
  /** Number of its line in the series’ ledger. */
  index: z.int(),
  /** Nothing until a signed head covers the line, some seconds after the act. */
  proof: z.nullable(lineProofShape),
};

/** A draw as everybody may see it. The secret is in `end`, and nowhere before. */
export const publicDrawAnswer = z.strictObject({
  id: z.string(),
  announced: z.strictObject(logged),
  end: z.nullable(z.strictObject({ kind: z.enum(['made', 'void']), ...logged })),
});

export type AnnounceRequest = z.output<typeof announceRequest>;
export type ValuesRequest = z.output<typeof valuesRequest>;
export type DrawnCar = z.output<typeof drawnCar>;
export type PublicDrawAnswer = z.output<typeof publicDrawAnswer>;
