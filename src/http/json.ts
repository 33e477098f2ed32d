import type * as z from 'zod/mini';
import { readBody } from '@/contracts/read-body';
import { type Failure, failure } from '@/domain/failure';
import { fail, type Result } from '@/domain/result';

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
  return readBody(schema, value);
};

/** The use case's answer as a response. */
export const answer = <T>(value: T, status = 200, headers: Record<string, string> = {}): Response =>
  new Response(JSON.stringify(value), {
    status,
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store', ...headers },
  });
