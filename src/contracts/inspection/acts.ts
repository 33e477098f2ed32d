import * as z from 'zod/mini';
import { areStrokes } from '@/domain/inspection/strokes';

const act = z.uuid('The act needs its identifier.');
const reason = z.string().check(z.maxLength(500, 'Write at most 500 characters.'));

export const assignRequest = z.strictObject({
  act,
  inspectorId: z.nullable(z.uuid('Choose an inspector.')),
  bay: z.string().check(z.maxLength(20, 'A bay has at most 20 characters.')),
  version: z.int(),
});

export const stateRequest = z.strictObject({
  act,
  to: z.enum(['open', 'hold', 'resume', 'refuse', 'stop', 'defer'], 'This cannot be asked for.'),
  reason,
  place: z.optional(z.string().check(z.maxLength(200, 'At most 200 characters.'))),
  seals: z.optional(z.string().check(z.maxLength(200, 'At most 200 characters.'))),
  bag: z.optional(z.string().check(z.maxLength(60, 'At most 60 characters.'))),
});

export const signRequest = z.strictObject({
  act,
  /** The chain's head as the signer saw it, hexadecimal: what is signed is what was read. */
  head: z.string().check(z.regex(/^[0-9a-f]{64}$/, 'The report’s state is missing.')),
  /** Evidence beside the signature, never instead of it; kept as drawn. */
  strokes: z.optional(
    z.array(z.string()).check(z.refine(areStrokes, 'These are no pen strokes of the pad.')),
  ),
});

export const reviseRequest = z.strictObject({
  act,
  reason: reason.check(z.minLength(1, 'A correction needs its reason.')),
});

export const actAnswer = z.strictObject({ state: z.string(), version: z.int() });
export const signAnswer = z.strictObject({ revision: z.int(), hash: z.string() });
