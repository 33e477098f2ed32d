import * as z from 'zod/mini';
import type { Failure } from '@/domain/failure';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { Result } from '@/domain/result';
import { isQuantityName, type QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { readBody } from '../read-body';
import { written } from '../rulebook/text';
import { boreLayout } from './layout';

const line = z.string().check(z.maxLength(200));
const hex = z.string().check(z.regex(/^[0-9a-f]{64}$/));

export const quantityName = z.pipe(
  z.string().check(z.refine(isQuantityName, 'There is no such quantity.')),
  z.transform((name) => name as QuantityName),
);

const file = z.strictObject({
  item: line,
  fileId: z.uuid(),
  name: z.string(),
  sha256: hex,
  bytes: z.string().check(z.regex(/^\d{1,12}$/)),
  type: line,
});

const reading = z.strictObject({
  position: line,
  quantity: quantityName,
  depth: line,
  axis: line,
  value: written,
  source: z.optional(
    z.strictObject({
      fileId: z.uuid(),
      file: z.string(),
      cell: line,
      held: z.optional(z.string()),
    }),
  ),
});

const shape = z.strictObject({
  document: z.literal('tagwire/paperwork'),
  version: z.literal('1'),
  series: line,
  season: line,
  className: line,
  competitor: line,
  carNumber: line,
  engine: z.strictObject({
    id: z.uuid(),
    reference: line,
    layout: boreLayout,
    blockCasting: line,
    headCastings: line,
    serial: line,
  }),
  rulesHash: hex,
  answers: z.array(
    z.union([
      z.strictObject({ subject: line, position: line, value: z.string() }),
      z.strictObject({ subject: line, position: line, written }),
    ]),
  ),
  sheets: z.array(z.strictObject({ subject: line, readings: z.array(reading) })),
  photographs: z.array(file),
  files: z.array(file),
  note: z.string(),
  replies: z.optional(z.array(z.strictObject({ item: line, text: z.string() }))),
});

/** Paperwork as handed in, back from its stored document (parsed JSON). */
export const readPaperworkDocument = (parsed: unknown): Result<PaperworkDocument, Failure> =>
  readBody(shape, parsed);
