import { Refusal } from '../api';

/** Why something could not be done, in words. */
export const failureWords = (error: unknown): string => {
  if (error instanceof Refusal) return error.detail;
  return error instanceof TypeError
    ? 'No connection. Send it again when there is one.'
    : error instanceof Error
      ? error.message
      : 'Not sent.';
};
