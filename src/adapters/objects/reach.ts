import { StoreUnreachable } from '@/services/ports';

/** What the SDK and Node put on errors of a connection, or of a store in trouble. */
interface StoreError {
  readonly code?: string;
  readonly name?: string;
  readonly $metadata?: { readonly httpStatusCode?: number };
}

const NO_CONNECTION =
  /^(ECONN|ENOTFOUND|EAI_AGAIN|EPIPE|ETIMEDOUT|EHOSTUNREACH|ENETUNREACH|ERR_STREAM_PREMATURE_CLOSE)/;

/** Asks the store. @throws StoreUnreachable where it gave no answer or none that helps; others as they are */
export const reach = async <T>(ask: () => Promise<T>): Promise<T> => {
  try {
    return await ask();
  } catch (error) {
    const { code = '', name = '', $metadata } = error as StoreError;
    const inTrouble = ($metadata?.httpStatusCode ?? 0) >= 500 || name === 'TimeoutError';
    if (!inTrouble && !NO_CONNECTION.test(code)) throw error;
    throw new StoreUnreachable('The object store does not answer.', { cause: error });
  }
};
