import type { APIRoute } from 'astro';
import * as z from 'zod/mini';
import { readBody } from '@/contracts/read-body';
import { type Failure, failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import { write } from '@/http/api';
import { problem } from '@/http/problem';
import { RateLimit } from './_rate-limit';

const limit = new RateLimit();

/** A calculator's endpoint: open to all, so limited by client address; nothing is kept. */
export const bench = <Request, Response>(
  schema: z.ZodMiniType<Request>,
  workOut: (request: Request) => Result<Response, Failure>,
): APIRoute => {
  const answer = write(z.unknown(), async ({ body }) => {
    const request = readBody(schema, body);
    return request.ok ? workOut(request.value) : request;
  });
  return async (context) => {
    const wait = limit.take(context.clientAddress, context.locals.ports.clock.now());
    if (wait === 0) return answer(context);
    const refused = problem(
      failure('too-many-requests', `Many requests came from your address. Wait ${wait} s.`),
    );
    refused.headers.set('retry-after', String(wait));
    return refused;
  };
};
