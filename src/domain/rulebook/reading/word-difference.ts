/** A stretch of text that stayed, went, or came. */
export interface Stretch {
  readonly kind: 'same' | 'gone' | 'new';
  readonly text: string;
}

/** Beyond this product of word counts the texts are set side by side as a whole. */
const MOST_PAIRS = 1_000_000;

const wordsOf = (text: string): readonly string[] => text.match(/\s+|[^\s]+/g) ?? [];

/** Lengths of the longest common run of words from each pair of places on. */
const commonLengths = (a: readonly string[], b: readonly string[]): readonly Uint32Array[] => {
  const lengths = Array.from({ length: a.length + 1 }, () => new Uint32Array(b.length + 1));
  for (let i = a.length - 1; i >= 0; i -= 1) {
    for (let j = b.length - 1; j >= 0; j -= 1) {
      const row = lengths[i];
      const below = lengths[i + 1];
      if (row === undefined || below === undefined) continue;
      row[j] = a[i] === b[j] ? (below[j + 1] ?? 0) + 1 : Math.max(below[j] ?? 0, row[j + 1] ?? 0);
    }
  }
  return lengths;
};

const joined = (stretches: readonly Stretch[]): readonly Stretch[] => {
  const result: Stretch[] = [];
  for (const stretch of stretches) {
    const last = result.at(-1);
    if (stretch.text === '') continue;
    if (last?.kind === stretch.kind)
      result[result.length - 1] = { ...last, text: last.text + stretch.text };
    else result.push(stretch);
  }
  return result;
};

/**
 * Two versions of a text, word by word: `same` and `gone` together are the text before, `same` and
 * `new` together the text after. Longest common subsequence.
 */
export const wordDifference = (before: string, after: string): readonly Stretch[] => {
  const a = wordsOf(before);
  const b = wordsOf(after);
  if (before === after) return joined([{ kind: 'same', text: before }]);
  if (a.length * b.length > MOST_PAIRS)
    return joined([
      { kind: 'gone', text: before },
      { kind: 'new', text: after },
    ]);
  const lengths = commonLengths(a, b);
  const stretches: Stretch[] = [];
  let i = 0;
  let j = 0;
  while (i < a.length || j < b.length) {
    const word = a[i];
    const other = b[j];
    const without = lengths[i + 1]?.[j] ?? -1;
    const within = lengths[i]?.[j + 1] ?? -1;
    if (word !== undefined && word === other) {
      stretches.push({ kind: 'same', text: word });
      i += 1;
      j += 1;
    } else if (word !== undefined && (other === undefined || without >= within)) {
      stretches.push({ kind: 'gone', text: word });
      i += 1;
    } else {
      stretches.push({ kind: 'new', text: other ?? '' });
      j += 1;
    }
  }
  return joined(stretches);
};
