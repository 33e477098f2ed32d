import type { PaperworkDraft } from '../draft';
import { type DraftField, type DraftFields, draftFields, draftFrom, typedIn } from './draft-fields';

/** One field that two devices filled in differently. */
export interface DraftConflict {
  readonly key: string;
  readonly field: DraftField;
  /** As typed; empty where it was taken out. */
  readonly mine: string;
  readonly theirs: string;
}

export type Side = 'mine' | 'theirs';

const keysOf = (theirs: DraftFields, mine: DraftFields): readonly string[] => [
  ...theirs.keys(),
  ...[...mine.keys()].filter((key) => !theirs.has(key)),
];

/** Which side holds, where one alone changed it; nothing where both did, or nobody knows. */
const decided = (
  base: DraftFields | undefined,
  mine: DraftFields,
  theirs: DraftFields,
  key: string,
): Side | undefined => {
  const [m, t] = [typedIn(mine.get(key)), typedIn(theirs.get(key))];
  if (m === t) return 'theirs';
  if (base === undefined) return undefined;
  const b = typedIn(base.get(key));
  if (m === b) return 'theirs';
  return t === b ? 'mine' : undefined;
};

/**
 * Fields on which a draft written here and a newer one from another device disagree. `base` is what both
 * began with; without it every difference is one to decide.
 */
export const draftConflicts = (
  base: PaperworkDraft | undefined,
  mine: PaperworkDraft,
  theirs: PaperworkDraft,
): readonly DraftConflict[] => {
  const [b, m, t] = [base && draftFields(base), draftFields(mine), draftFields(theirs)];
  return keysOf(t, m).flatMap((key): DraftConflict[] => {
    const field = m.get(key) ?? t.get(key);
    return field === undefined || decided(b, m, t, key) !== undefined
      ? []
      : [{ key, field, mine: typedIn(m.get(key)), theirs: typedIn(t.get(key)) }];
  });
};

/** One draft out of two: what one device alone changed is taken, the rest as chosen, by key; mine if not. */
export const mergeDrafts = (
  base: PaperworkDraft | undefined,
  mine: PaperworkDraft,
  theirs: PaperworkDraft,
  chosen: ReadonlyMap<string, Side> = new Map(),
): PaperworkDraft => {
  const [b, m, t] = [base && draftFields(base), draftFields(mine), draftFields(theirs)];
  const fields = keysOf(t, m).flatMap((key): DraftField[] => {
    const side = decided(b, m, t, key) ?? chosen.get(key) ?? 'mine';
    const field = (side === 'mine' ? m : t).get(key);
    return field === undefined ? [] : [field];
  });
  return draftFrom(fields);
};
