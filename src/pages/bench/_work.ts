import type * as z from 'zod/mini';
import { readBody } from '@/contracts/read-body';
import type { Failure } from '@/domain/failure';
import type { Result } from '@/domain/result';

/** The same contract and the same use case as the API's, over what a form holds. */
export function work<Request, Response>(
  schema: z.ZodMiniType<Request>,
  body: unknown,
  workOut: (request: Request) => Result<Response, Failure>,
): Result<Response, Failure> {
  const request = readBody(schema, body);
  return request.ok ? workOut(request.value) : request;
}
