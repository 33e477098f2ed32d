import * as z from 'zod/mini';
import { type Failure, failure, invalid } from '../failure';
import { fail, ok, type Result } from '../result';
import { findWhole, utf8 } from './bytes';
import { canonicalJson, parseCanonical } from './canonical';
import type { LineKind } from './line-kind';
import { hashLeaf } from './tree';

/**
 * STORED AND SIGNED: published bytes depend on this shape. It never changes; a new shape is a new
 * version. docs/record-format.md says it byte by byte.
 *
 * A line names no person, car or place: content enters as salted commitments only.
 */
const WORD = /^[a-z][a-z0-9]*(-[a-z0-9]+)*$/;
const HASH = /^[0-9a-f]{64}$/;
const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;
const WHOLE = /^(0|[1-9]\d{0,15})$/;
const INSTANT = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/;

const text = (pattern: RegExp) => z.string().check(z.regex(pattern));

const lineShape = z.strictObject({
  v: z.literal('1'),
  type: z.literal('tagwire/line'),
  series: text(UUID),
  index: text(WHOLE),
  kind: text(WORD),
  at: text(INSTANT),
  act: text(UUID),
  commitments: z.array(z.strictObject({ role: text(WORD), commitment: text(HASH) })),
  refs: z.record(text(WORD), z.union([text(HASH), text(UUID), text(WHOLE), text(INSTANT)])),
});

export type Line = z.infer<typeof lineShape>;

export interface NewLine {
  readonly series: string;
  readonly index: number;
  readonly kind: LineKind;
  /** Server time, `YYYY-MM-DDTHH:MM:SS.mmmZ`. */
  readonly at: string;
  /** The id of the act that caused the line. */
  readonly act: string;
  /** Role → commitment in hex. */
  readonly commitments: Readonly<Record<string, string>>;
  /** Hashes, ids, line numbers and instants only. */
  readonly refs?: Readonly<Record<string, string>>;
}

/** The exact text of a line. Throws on what a line may not hold: that is a defect of the caller. */
export const lineText = (line: NewLine): string => {
  const { commitments, refs = {}, index, ...rest } = line;
  const roles = Object.keys(commitments).sort();
  const written = canonicalJson({
    v: '1',
    type: 'tagwire/line',
    ...rest,
    index: String(index),
    commitments: roles.map((role) => ({ role, commitment: commitments[role] })),
    refs,
  });
  const read = parseLine(written);
  if (!read.ok) throw new TypeError(`Not a ledger line: ${JSON.stringify(read.failure)}`);
  return written;
};

/** Reads a line of any kind, a later one included, if it is well formed and in canonical form. */
export const parseLine = (written: string): Result<Line, Failure> => {
  const json = parseCanonical(written);
  if (!json.ok) return json;
  const shaped = lineShape.safeParse(json.value);
  if (!shaped.success) {
    return fail(failure('damaged-file', 'This is not a ledger line of version 1.'));
  }
  const line = shaped.data;
  const fault = faultOf(line);
  return fault === undefined ? ok(line) : fail(invalid([fault]));
};

const faultOf = (line: Line) => {
  if (findWhole(line.index) === undefined) return { pointer: '/index', detail: 'Out of range.' };
  const at = new Date(line.at);
  if (Number.isNaN(at.getTime()) || at.toISOString() !== line.at) {
    return { pointer: '/at', detail: 'There is no such instant.' };
  }
  const ordered = line.commitments.every(
    (item, i, all) => i === 0 || (all[i - 1]?.role ?? '') < item.role,
  );
  return ordered
    ? undefined
    : { pointer: '/commitments', detail: 'Roles stand once each, in ascending order.' };
};

/** The leaf of a line: SHA-256(0x00 ‖ UTF-8 of its exact text). */
export const lineLeaf = (written: string): Uint8Array => hashLeaf(utf8(written));
