import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Stretch, wordDifference } from '@/domain/rulebook/reading/word-difference';

const text = (stretches: readonly Stretch[], ...kinds: readonly Stretch['kind'][]) =>
  stretches
    .filter((row) => kinds.includes(row.kind))
    .map((row) => row.text)
    .join('');

const words = fc
  .array(
    fc.constantFrom('the', 'lift', 'is', 'at', 'most', '0.4600', '0.4800', 'in', ' ', '  ', '\n'),
  )
  .map((rows) => rows.join(' '));

describe('two versions of a text', () => {
  it('show the words that changed and no others', () => {
    expect(wordDifference('at most 0.4600 in', 'at most 0.4800 in')).toEqual([
      { kind: 'same', text: 'at most ' },
      { kind: 'gone', text: '0.4600' },
      { kind: 'new', text: '0.4800' },
      { kind: 'same', text: ' in' },
    ]);
    expect(wordDifference('same', 'same')).toEqual([{ kind: 'same', text: 'same' }]);
    expect(wordDifference('', 'new')).toEqual([{ kind: 'new', text: 'new' }]);
    expect(wordDifference('', '')).toEqual([]);
  });

  it('can always be put together again', () => {
    fc.assert(
      fc.property(fc.oneof(words, fc.string()), fc.oneof(words, fc.string()), (before, after) => {
        const found = wordDifference(before, after);
        expect(text(found, 'same', 'gone')).toBe(before);
        expect(text(found, 'same', 'new')).toBe(after);
      }),
    );
  });

  it('stand side by side when they are very long', () => {
    const long = Array.from({ length: 1200 }, (_, i) => `w${i}`).join(' ');
    expect(wordDifference(long, `${long} end`).map((row) => row.kind)).toEqual(['gone', 'new']);
  });
});
