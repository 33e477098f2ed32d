import * as z from 'zod/mini';
import { type Failure, failure } from '../failure';
import { fail, ok, type Result } from '../result';

/**
 * What a decision and its notice read of a signed report (`tagwire/report`). Members that are not
 * named here are left alone, so that a later report, which has more, is still read.
 */
const text = z.string();
const written = z.object({ text, unit: text });
const place = z.object({ bank: text, cylinder: text, valve: text, index: z.optional(text) });
const flag = z.nullable(z.boolean());

const position = z.object({
  position: text,
  state: z.enum([
    'within',
    'outside',
    'too-close',
    'not-measured',
    'could-not-be-reached',
    'no-statement',
    'complies',
    'does-not-comply',
    'judged',
    'waived',
  ]),
  pass: flag,
  fit: flag,
  figure: z.optional(text),
  value: z.optional(written),
  uncertainty: z.optional(written),
  coverageFactor: z.optional(text),
  budget: z.optional(z.array(z.object({ words: text, share: text }))),
  guardBand: z.optional(written),
  checked: z.optional(z.array(text)),
  answer: z.optional(text),
  sentence: text,
  rule: z.optional(text),
});

const finding = z.object({
  clause: text,
  heading: text,
  state: position.shape.state,
  pass: flag,
  fit: flag,
  advisory: z.boolean(),
  perPosition: z.array(position),
  limit: z.optional(text),
  sentence: text,
  cautions: z.array(text),
  readings: z.array(text),
  gauges: z.array(text),
  photographs: z.array(text),
});

const row = z.object({
  id: text,
  takenBy: text,
  occurredAt: text,
  quantity: text,
  depth: text,
  axis: text,
  set: text,
  gaugeId: text,
  zeroRunId: z.optional(text),
  value: written,
});

const gauge = z.object({
  id: text,
  code: text,
  kind: text,
  range: z.optional(z.object({ from: written, to: written })),
  certificate: z.optional(z.object({ number: text })),
  calibratedOn: z.optional(text),
  dueOn: z.optional(text),
});

const zero = z.object({
  runId: text,
  kind: z.enum(['opening', 'closing']),
  gaugeId: text,
  ringId: z.optional(text),
  reading: written,
});

const shape = z.object({
  document: z.literal('tagwire/report'),
  inspectionId: text,
  inspector: z.object({ id: text, name: text }),
  witness: z.object({
    name: text,
    role: text,
    outcome: z.enum(['signed', 'refused', 'absent']),
    remark: z.optional(text),
  }),
  readings: z.array(z.object({ row, place, state: text })),
  zeros: z.array(zero),
  remarks: z.array(z.object({ kind: text, occurredAt: text })),
  gauges: z.array(gauge),
  findings: z.array(finding),
  signedAt: text,
});

export type ReportView = z.infer<typeof shape>;
export type ReportFinding = ReportView['findings'][number];
export type ReportPosition = ReportFinding['perPosition'][number];

/** Reads a signed report's canonical text. */
export const readReport = (document: string): Result<ReportView, Failure> => {
  const read = shape.safeParse(JSON.parse(document));
  return read.success
    ? ok(read.data)
    : fail(
        failure(
          'damaged-file',
          `The signed report cannot be read at ${read.error.issues[0]?.path.join('/') ?? '/'}.`,
        ),
      );
};
