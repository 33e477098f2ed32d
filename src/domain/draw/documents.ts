import * as z from 'zod/mini';
import { type Failure, failure } from '../failure';
import { parseCanonical } from '../ledger/canonical';
import { fail, ok, type Result } from '../result';
import { findCommitmentFault } from './commitment-fault';

/**
 * STORED AND SIGNED: hashes of published draws depend on these shapes. They never change; a new
 * shape is a new version. docs/record-format.md says them byte by byte.
 */
const HASH = z.string().check(z.regex(/^[0-9a-f]{64}$/));
const WHOLE = z.string().check(z.regex(/^(0|[1-9]\d{0,4})$/));
const TEXT = z.string().check(z.minLength(1), z.maxLength(400));
const INSTANT = z.string().check(z.regex(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/));
const ID = z.string().check(z.regex(/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/));

const announced = z.strictObject({
  name: TEXT,
  ifMissing: z.enum(['left-out', 'substitute', 'void']),
  substitute: z.string().check(z.maxLength(400)),
});

const published = z.strictObject({
  name: TEXT,
  source: z.enum(['announced', 'substitute', 'missing']),
  numbers: z.array(z.string().check(z.maxLength(20))).check(z.maxLength(200)),
});

/** Published and logged before the session. */
export const commitmentShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/draw-commitment'),
  draw: ID,
  series: ID,
  event: ID,
  /** What the draw is for, within the event: one draw a subject. */
  subject: TEXT,
  /** The draw-void document this draw follows, by SHA-256; empty for a subject's first draw. */
  follows: z.union([HASH, z.literal('')]),
  /** Numbered from 1 without a gap; cars by number only. */
  pool: z.array(z.strictObject({ number: WHOLE, car: TEXT })).check(z.minLength(1)),
  select: WHOLE,
  secretHash: HASH,
  /** When the session begins that makes the values; the commitment is logged before. */
  sessionAt: INSTANT,
  values: z.array(announced).check(z.minLength(1), z.maxLength(20)),
});

/** Published after the values came into being. */
export const madeShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/draw-made'),
  draw: ID,
  /** SHA-256 of the canonical commitment document. */
  commitment: HASH,
  secret: HASH,
  values: z.array(published),
  /** Cars in the order drawn. */
  selected: z.array(z.strictObject({ number: WHOLE, car: TEXT })),
});

/** Published instead, when a draw cannot count. */
export const voidShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/draw-void'),
  draw: ID,
  commitment: HASH,
  reason: TEXT,
  /** The secret is shown all the same, so that anybody sees what the draw would have been; empty only if lost. */
  secret: z.union([HASH, z.literal('')]),
});

export type DrawCommitment = z.infer<typeof commitmentShape>;
export type DrawMade = z.infer<typeof madeShape>;
export type DrawVoid = z.infer<typeof voidShape>;

const read =
  <T>(shape: z.ZodMiniType<T>, name: string) =>
  (text: string): Result<T, Failure> => {
    const json = parseCanonical(text);
    if (!json.ok) return json;
    const parsed = shape.safeParse(json.value);
    return parsed.success ? ok(parsed.data) : fail(failure('damaged-file', `Not a ${name}.`));
  };

export const readDrawMade = read(madeShape, 'result of a draw');
export const readDrawVoid = read(voidShape, 'void draw');

export const readDrawCommitment = (text: string): Result<DrawCommitment, Failure> => {
  const commitment = read(commitmentShape, 'commitment to a draw')(text);
  if (!commitment.ok) return commitment;
  const fault = findCommitmentFault(commitment.value);
  return fault === undefined ? commitment : fail(failure('damaged-file', fault));
};
