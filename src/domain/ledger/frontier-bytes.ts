import { type Failure, failure } from '../failure';
import { fail, ok, type Result } from '../result';
import { bigEndian, concat } from './bytes';
import type { Frontier } from './tree';

const countOnes = (size: number): number => {
  let ones = 0;
  for (let rest = size; rest > 0; rest = Math.floor(rest / 2)) ones += rest % 2;
  return ones;
};

/** The size as 8 bytes, most significant first, then each hash, largest subtree first. */
export const encodeFrontier = (frontier: Frontier): Uint8Array =>
  concat(bigEndian(frontier.size, 8), ...frontier.hashes);

export const decodeFrontier = (bytes: Uint8Array): Result<Frontier, Failure> => {
  const size = bytes.subarray(0, 8).reduce((sum, byte) => sum * 256 + byte, 0);
  const fits =
    bytes.length >= 8 && Number.isSafeInteger(size) && bytes.length === 8 + 32 * countOnes(size);
  if (!fits) return fail(failure('damaged-file', 'The stored head of the ledger is damaged.'));
  const hashes = Array.from({ length: (bytes.length - 8) / 32 }, (_, i) =>
    bytes.slice(8 + 32 * i, 40 + 32 * i),
  );
  return ok({ size, hashes });
};
