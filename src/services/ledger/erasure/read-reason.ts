import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';

/** @param what what is to be said, as in "why it is erased, without naming anybody" */
export const readReason = (text: string, what: string): Result<string, Failure> => {
  const reason = text.trim();
  if (reason.length >= 10 && reason.length <= 500) return ok(reason);
  return fail(invalid([{ pointer: '/reason', detail: `Say in 10 to 500 characters ${what}.` }]));
};
