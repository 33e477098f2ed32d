import * as z from 'zod/mini';
import { type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';

type Path = readonly PropertyKey[];
type Issue = z.core.$ZodIssue;

/** JSON Pointer (RFC 6901) to a place in what was sent; the whole of it is the empty pointer. */
export const pointerTo = (path: Path): string =>
  path.map((key) => `/${String(key).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');

/** Takes a body by its shape, or says of every wrong place what is wanted there. */
export function readBody<S extends z.core.$ZodType>(
  schema: S,
  body: unknown,
): Result<z.output<S>, Failure> {
  const read = z.safeParse(schema, body);
  if (read.success) return ok(read.data);
  return fail(invalid(read.error.issues.flatMap((issue) => faultsOf(issue, [], body))));
}

/** What the library says where a contract says nothing. */
const UNWORDED = 'Invalid input';

function faultsOf(issue: Issue, above: Path, body: unknown): readonly Fault[] {
  const path = [...above, ...issue.path];
  const fault = (detail: string) => [{ pointer: pointerTo(path), detail }];
  // A contract that found its own words for a place keeps them.
  if (issue.message !== UNWORDED && issue.code !== 'unrecognized_keys') return fault(issue.message);
  if (valueAt(body, path) === undefined) return fault('This field is required.');
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({
        pointer: pointerTo([...path, key]),
        detail: 'There is no field of this name here.',
      }));
    case 'invalid_union':
      return issue.errors.length === 0
        ? fault('This is none of the known names.')
        : nearest(issue.errors).flatMap((inner) => faultsOf(inner, path, body));
    case 'invalid_value':
      return fault(`Write one of: ${issue.values.map(String).join(', ')}.`);
    case 'invalid_type':
      return fault(WANTED[issue.expected] ?? `This should be of the type ${issue.expected}.`);
    case 'too_small':
      return fault(tooSmall(issue.origin, issue.minimum, issue.inclusive ?? true));
    case 'too_big':
      return fault(tooBig(issue.origin, issue.maximum, issue.inclusive ?? true));
    default:
      return fault('This cannot be read here.');
  }
}

const WANTED: Readonly<Record<string, string>> = {
  string: 'Write this as text in quotation marks, such as "0.8440".',
  number: 'Write this as a number, or as text that is one.',
  int: 'Write this as a whole number.',
  array: 'Write this as a list.',
  tuple: 'Write this as a list.',
  object: 'Write this as an object.',
  boolean: 'Write true or false.',
  null: 'Write this as text, or null where nothing was read.',
};

const tooSmall = (origin: string, minimum: number | bigint, inclusive: boolean): string => {
  if (origin === 'string') return 'Nothing is written here.';
  if (origin === 'array') return `At least ${minimum} are needed here.`;
  return inclusive ? `This is at least ${minimum}.` : `This is larger than ${minimum}.`;
};

const tooBig = (origin: string, maximum: number | bigint, inclusive: boolean): string => {
  if (origin === 'string') return `At most ${maximum} characters fit here.`;
  if (origin === 'array') return `At most ${maximum} fit here.`;
  return inclusive ? `This is at most ${maximum}.` : `This is less than ${maximum}.`;
};

/** Of the ways in which a value could have been meant, the one that was followed furthest. */
const nearest = (branches: readonly (readonly Issue[])[]): readonly Issue[] => {
  const depth = (branch: readonly Issue[]) => Math.max(0, ...branch.map(depthOf));
  return branches.reduce((best, branch) => (depth(branch) > depth(best) ? branch : best));
};

const depthOf = (issue: Issue): number =>
  issue.path.length +
  (issue.code === 'invalid_union' && issue.errors.length > 0
    ? Math.max(0, ...nearest(issue.errors).map(depthOf))
    : 0);

const valueAt = (body: unknown, path: Path): unknown =>
  path.reduce<unknown>(
    (value, key) =>
      typeof value === 'object' && value !== null
        ? (value as Record<PropertyKey, unknown>)[key]
        : undefined,
    body,
  );
