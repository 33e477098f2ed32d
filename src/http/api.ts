import type { APIContext, APIRoute } from 'astro';
import type * as z from 'zod/mini';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import type { Result } from '@/domain/result';
import type { Ports } from '@/services/ports';
import { answer, readJson } from './json';
import { problem } from './problem';

interface Asked<B> {
  readonly ports: Ports;
  readonly actor: Actor | null;
  readonly params: Readonly<Record<string, string | undefined>>;
  readonly body: B;
  readonly context: APIContext;
}

const present = (result: Result<unknown, Failure>): Response => {
  if (!result.ok) {
    // Not JSON at all is the one malformed request; everything else has its own status.
    const malformed =
      result.failure.faults?.length === 1 && result.failure.faults[0]?.detail === 'Not JSON.';
    return malformed ? problem(result.failure, 400) : problem(result.failure);
  }
  return result.value instanceof Response ? result.value : answer(result.value);
};

/** A JSON endpoint with a body: contract, use case, answer or problem details. */
export const write =
  <S extends z.core.$ZodType>(
    schema: S,
    run: (asked: Asked<z.output<S>>) => Promise<Result<unknown, Failure>>,
  ): APIRoute =>
  async (context) => {
    const { ports, actor } = context.locals;
    const body = await readJson(context.request, schema);
    if (!body.ok) return present(body);
    return present(await run({ ports, actor, params: context.params, body: body.value, context }));
  };

/** A JSON endpoint without a body. */
export const read =
  (run: (asked: Asked<undefined>) => Promise<Result<unknown, Failure>>): APIRoute =>
  async (context) => {
    const { ports, actor } = context.locals;
    return present(await run({ ports, actor, params: context.params, body: undefined, context }));
  };

export const signInFirst = (): Failure => failure('sign-in-required', 'Sign in, then try again.');
