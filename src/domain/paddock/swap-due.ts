import type { SwapListed } from './paddock-rows';

type Due = Pick<SwapListed, 'paperworkId' | 'dueAt'>;

/** The swap whose rest this paperwork is, the one that is due first. */
export const swapOf = <S extends Due>(swaps: readonly S[], paperworkId: string): S | undefined =>
  swaps
    .filter((swap) => swap.paperworkId === paperworkId)
    .toSorted((a, b) => a.dueAt.localeCompare(b.dueAt))[0];

/** At its very instant it is overdue: handed in *by* then. Both are ISO 8601 instants in UTC. */
export const isOverdue = ({ dueAt }: Pick<Due, 'dueAt'>, now: string): boolean => dueAt <= now;

/** Paperwork whose rest is due first, in the order of its days; then everything else as it stood. */
export const dueFirst = <R extends { readonly id: string }>(
  rows: readonly R[],
  swaps: readonly Due[],
): readonly R[] => {
  const day = ({ id }: R) => swapOf(swaps, id)?.dueAt;
  return rows.toSorted((a, b) => {
    const [first, second] = [day(a), day(b)];
    if (first === second) return 0;
    if (first === undefined) return 1;
    return second !== undefined && second < first ? 1 : -1;
  });
};
