import { readSheetNow, type SheetNow } from '@/contracts/inspection/sheet';
import { secondQuery } from '@/domain/inspection/second-set/asked';
import type { Sheet } from '../sheet/sheet';

const TIMEOUT_MS = 15_000;

/** The sheet as the server has it; nothing while it cannot be reached or does not give it. */
export const fetchSheet = async (
  { inspectionId, second }: Pick<Sheet, 'inspectionId' | 'second'>,
  left: AbortSignal,
): Promise<SheetNow | undefined> => {
  const query = second === undefined ? '' : `?${secondQuery(second)}`;
  try {
    const answer = await fetch(`/api/inspections/${inspectionId}/sheet${query}`, {
      signal: AbortSignal.any([left, AbortSignal.timeout(TIMEOUT_MS)]),
    });
    const read: unknown = await answer.json();
    return answer.ok ? readSheetNow(read) : undefined;
  } catch {
    return undefined;
  }
};
