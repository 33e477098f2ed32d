import type { LineProof } from '@/domain/ledger/verify/line-proof';
import { findCovering } from '../checkpoint/find-checkpoint';
import { findPublishedKey } from '../checkpoint/published-key';
import { type SigningDeps, signCheckpoint } from '../checkpoint/sign-checkpoint';
import { proofUnder } from './prove-line';

/**
 * The proof of a line under the first signed head that covers it; where there is none yet, the head
 * is signed now. Throws when it cannot be: the job that asks comes back later.
 */
export const proveForNotice = async (
  deps: SigningDeps,
  seriesId: string,
  index: number,
): Promise<{
  readonly proof: LineProof;
  readonly key: string;
  /** Which signed head of the series it is, counted from 1. */
  readonly checkpoint: number;
}> => {
  let head = await findCovering(deps.db, seriesId, index);
  if (head === undefined) {
    await signCheckpoint(deps, { seriesId });
    head = await findCovering(deps.db, seriesId, index);
  }
  const proof = head && (await proofUnder(deps, seriesId, index, head));
  const key = head && (await findPublishedKey(deps.db, seriesId, head.size));
  if (head === undefined || proof === undefined || key === undefined) {
    throw new Error(`No signed head covers line ${index} of ${seriesId}.`);
  }
  const [row] = await deps.db.execute<{ number: string }[]>(
    'select count(*) as number from record.checkpoint where series_id = ? and size <= ?',
    [seriesId, head.size],
  );
  return { proof, key: key.key, checkpoint: Number(row?.number) };
};
