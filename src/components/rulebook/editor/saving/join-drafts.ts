import { toDocument } from '@/domain/rulebook/document';
import type { Part } from './parts';

export type Side = 'mine' | 'theirs';

/** One part that stands differently here and there; an absent side has removed it, or never had it. */
export interface Choice {
  readonly id: string;
  readonly label: string;
  readonly mine: Part | undefined;
  readonly theirs: Part | undefined;
  /** The side that alone changed it; nothing where both did, and a person has to choose. */
  readonly suggested: Side | undefined;
}

const same = (a: Part | undefined, b: Part | undefined): boolean =>
  a === undefined || b === undefined
    ? a === b
    : JSON.stringify(toDocument(a.value)) === JSON.stringify(toDocument(b.value));

const byId = (parts: readonly Part[]) => new Map(parts.map((part) => [part.id, part]));

/** Every part in which two drafts that grew from `base` differ, in their order. */
export const findChoices = (
  base: readonly Part[],
  mine: readonly Part[],
  theirs: readonly Part[],
): readonly Choice[] => {
  const [was, here, there] = [byId(base), byId(mine), byId(theirs)];
  return [...new Set([...here.keys(), ...there.keys()])].flatMap((id): readonly Choice[] => {
    const [a, b, c] = [here.get(id), there.get(id), was.get(id)];
    if (same(a, b)) return [];
    const suggested = same(b, c) ? 'mine' : same(a, c) ? 'theirs' : undefined;
    return [{ id, label: (a ?? b)?.label ?? id, mine: a, theirs: b, suggested }];
  });
};

/** The parts once every difference is decided; what nobody decided stays as it is here. */
export const joined = (
  mine: readonly Part[],
  choices: readonly Choice[],
  picked: ReadonlyMap<string, Side>,
): readonly Part[] => {
  const decided = new Map(choices.map((choice) => [choice.id, choice]));
  const kept = mine.flatMap((part) => {
    const choice = decided.get(part.id);
    if (choice === undefined || picked.get(part.id) !== 'theirs') return [part];
    return choice.theirs === undefined ? [] : [choice.theirs];
  });
  const added = choices.flatMap((choice) =>
    choice.mine === undefined && picked.get(choice.id) === 'theirs' && choice.theirs !== undefined
      ? [choice.theirs]
      : [],
  );
  return [...kept, ...added];
};
