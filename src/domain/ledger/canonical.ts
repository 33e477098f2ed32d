import canonicalize from 'canonicalize';
import { type Failure, type Fault, invalid } from '../failure';
import { fail, ok, type Result } from '../result';
import { utf8 } from './bytes';

/** What a record's document may hold. Numbers are written as text, so that 0.8440 keeps its zero. */
export type Json = null | boolean | string | readonly Json[] | { readonly [key: string]: Json };

const DEEPEST = 32;

/**
 * The canonical form of RFC 8785 (JSON Canonicalization Scheme).
 * Throws on what JSON cannot hold: NaN, infinity, a lone surrogate, a cycle, undefined.
 */
export const canonicalJson = (value: unknown): string => {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('The value has no JSON form.');
  return text;
};

export const canonicalBytes = (value: Json): Uint8Array => utf8(canonicalJson(value));

/** RFC 8785 for documents of the record: every number, undefined, or ill-formed text is named by its place. */
export const canonicalDocument = (value: unknown): Result<string, Failure> => {
  const faults = faultsOf(value, '', 0);
  return faults.length === 0 ? ok(canonicalJson(value)) : fail(invalid(faults));
};

/** Reads a document only if the text is its own canonical form, so that one document has one hash. */
export const parseCanonical = (text: string): Result<Json, Failure> => {
  const value = parse(text);
  if (value === undefined) return fail(invalid([fault('', 'This is not JSON.')]));
  const canonical = canonicalDocument(value);
  if (!canonical.ok) return canonical;
  return canonical.value === text
    ? ok(value as Json)
    : fail(invalid([fault('', 'This JSON is not in canonical form (RFC 8785).')]));
};

const parse = (text: string): unknown => {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
};

const fault = (pointer: string, detail: string): Fault => ({ pointer, detail });

const step = (key: string): string => `/${key.replaceAll('~', '~0').replaceAll('/', '~1')}`;

const isPlain = (value: object): boolean => {
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === Object.prototype || prototype === null;
};

const textFaults = (text: string, pointer: string): readonly Fault[] =>
  /\p{Surrogate}/u.test(text) ? [fault(pointer, 'The text is not valid Unicode.')] : [];

const faultsOf = (value: unknown, pointer: string, depth: number): readonly Fault[] => {
  if (value === null || typeof value === 'boolean') return [];
  if (typeof value === 'string') return textFaults(value, pointer);
  if (typeof value === 'number') return [fault(pointer, 'Write the number as text.')];
  if (typeof value !== 'object') return [fault(pointer, 'JSON cannot hold this value.')];
  if (depth === DEEPEST) return [fault(pointer, `Nested deeper than ${DEEPEST} levels.`)];
  if (Array.isArray(value)) {
    return Array.from(value, (item: unknown, i) =>
      faultsOf(item, `${pointer}/${i}`, depth + 1),
    ).flat();
  }
  if (!isPlain(value))
    return [fault(pointer, 'Only plain objects, lists and text may stand here.')];
  return Object.entries(value).flatMap(([key, item]) => [
    ...textFaults(key, pointer),
    ...faultsOf(item, pointer + step(key), depth + 1),
  ]);
};
