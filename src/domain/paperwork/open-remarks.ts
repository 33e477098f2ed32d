import { type Compared, paperworkDifferences } from './differences';
import type { ItemRemark } from './state';

/** What is compared with the version that came back. */
export interface RemarkedDraft extends Compared {
  readonly note: string;
  readonly replies?: readonly ItemRemark[] | undefined;
}

/**
 * Remarks that the draft neither follows nor answers: nothing of the item changed since the version
 * that came back, and nobody wrote why not. A remark on the whole is met by any change.
 */
export const openRemarks = (
  remarks: readonly ItemRemark[],
  before: RemarkedDraft,
  now: RemarkedDraft,
): readonly ItemRemark[] => {
  if (remarks.length === 0) return [];
  const changed = new Set(paperworkDifferences(before, now).map(({ item }) => item));
  const anything = changed.size > 0 || before.note.trim() !== now.note.trim();
  const isAnswered = (item: string) =>
    (now.replies ?? []).some((reply) => reply.item === item && reply.text.trim() !== '');
  return remarks.filter(
    ({ item }) => !isAnswered(item) && !(item === 'general' ? anything : changed.has(item)),
  );
};
