import { type Actor, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../ports';
import { type PartKept, readPartsIn } from './read-parts';

export interface InImpound {
  /** Held now; those to be given back first. */
  readonly held: readonly (PartKept & { readonly due: boolean })[];
  readonly returned: readonly PartKept[];
}

/** Nobody may still appeal, and no later day was set. Nothing decided yet: not due. */
const isDue = (part: PartKept, now: Date): boolean => {
  if (part.appealUntil === null && part.holdUntil === null) return false;
  return [part.appealUntil, part.holdUntil].every(
    (until) => until === null || Date.parse(until) < now.getTime(),
  );
};

/** What is held where, by whom, until when, in every series whose inspections the actor reads. */
export const listImpound = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<InImpound> => {
  const parts = await readPartsIn(deps.db, seriesWhere(actor, 'inspection.read'));
  const now = deps.clock.now();
  const held = parts
    .filter(({ custody }) => custody.holder !== undefined)
    .map((part) => ({ ...part, due: isDue(part, now) }));
  return {
    held: [...held.filter(({ due }) => due), ...held.filter(({ due }) => !due)],
    returned: parts.filter(({ custody }) => custody.holder === undefined),
  };
};
