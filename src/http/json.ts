import type * as z from 'zod/mini';
import { type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';

/** JSON Pointer of a path. */
export const pointer = (path: readonly PropertyKey[]): string =>
  path.map((step) => `/${String(step).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');

export const faultsOf = (error: z.core.$ZodError): readonly Fault[] =>
  error.issues.flatMap((issue): Fault[] =>
    issue.code === 'unrecognized_keys'
      ? issue.keys.map((key) => ({
          pointer: pointer([...issue.path, key]),
          detail: 'There is no such field.',
        }))
      : [{ pointer: pointer(issue.path), detail: issue.message }],
  );

/** Reads a JSON body against a contract. Malformed JSON is told apart from fields at fault. */
export const readJson = async <S extends z.core.$ZodType>(
  request: Request,
  schema: S,
): Promise<Result<z.output<S>, Failure>> => {
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase();
  if (type !== 'application/json') {
    return fail(failure('unsupported-file', 'Send the body as application/json.'));
  }
  let value: unknown;
  try {
    value = JSON.parse(await request.text());
  } catch {
    return fail(
      failure('invalid', 'The body is not JSON.', [{ pointer: '', detail: 'Not JSON.' }]),
    );
  }
  const { safeParse } = await import('zod/mini');
  const read = safeParse(schema, value);
  return read.success ? ok(read.data) : fail(invalid(faultsOf(read.error)));
};

/** The use case's answer as a response. */
export const answer = <T>(value: T, status = 200, headers: Record<string, string> = {}): Response =>
  new Response(JSON.stringify(value), {
    status,
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store', ...headers },
  });
