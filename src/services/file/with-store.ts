import { type Failure, failure } from '@/domain/failure';
import { fail, type Result } from '@/domain/result';
import { StoreUnreachable } from '../ports';

export const STORE_WORDS =
  'The file store does not answer just now. Nothing is lost: try again in a minute.';

/** A store that does not answer is an answer, too. */
export const withStore = async <T>(
  run: () => Promise<Result<T, Failure>>,
): Promise<Result<T, Failure>> => {
  try {
    return await run();
  } catch (error) {
    if (error instanceof StoreUnreachable) return fail(failure('unavailable', STORE_WORDS));
    throw error;
  }
};
