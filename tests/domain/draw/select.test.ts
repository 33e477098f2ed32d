import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bitsNeeded } from '@/domain/draw/entropy';
import { rfcMd5, select } from '@/domain/draw/select';
import { valuesText } from '@/domain/draw/values';
import { utf8 } from '@/domain/ledger/bytes';
import { checkValue, hex } from '../ledger/check-value';

const rfc = checkValue<
  { sources: (string | number[])[]; key: string; pool: number },
  { digests: string[]; selected: number[] }
>('rfc3797-sec6');

describe('the selection of RFC 3797', () => {
  it('makes the key of section 6 from its sources', () => {
    const values = rfc.inputs.sources.map((source) => ({
      name: 'source',
      source: 'announced' as const,
      numbers: typeof source === 'string' ? [source] : source.map(String),
    }));
    expect(valuesText(values)).toBe(rfc.inputs.key);
  });

  it('gives every digest and choice of section 6 with MD5', () => {
    const rounds = select(
      utf8(rfc.inputs.key),
      rfc.inputs.pool,
      rfc.expected.selected.length,
      rfcMd5,
    );
    expect(rounds.map(({ digest }) => hex(digest).toUpperCase())).toEqual(rfc.expected.digests);
    expect(rounds.map(({ chosen }) => chosen)).toEqual(rfc.expected.selected);
  });

  it('gives the entropy table of section 3.3', () => {
    const { inputs, expected } = checkValue<{ select: number; pool: number[] }, { bits: number[] }>(
      'rfc3797-sec3.3-entropy',
    );
    expect(inputs.pool.map((pool) => bitsNeeded(pool, inputs.select))).toEqual(expected.bits);
    expect(bitsNeeded(9, 9)).toBe(0);
    expect(bitsNeeded(2, 1)).toBe(1);
  });

  it('selects each number once, all of them when all are asked for', () => {
    fc.assert(
      fc.property(fc.uint8Array(), fc.integer({ min: 1, max: 60 }), fc.nat(), (key, pool, n) => {
        const count = n % (pool + 1);
        const chosen = select(key, pool, count).map((round) => round.chosen);
        expect(new Set(chosen).size).toBe(count);
        expect(chosen.every((number) => number >= 1 && number <= pool)).toBe(true);
        const all = select(key, pool, pool).map((round) => round.chosen);
        expect(all.slice(0, count)).toEqual(chosen);
        expect(all.toSorted((a, b) => a - b)).toEqual(
          Array.from({ length: pool }, (_, i) => i + 1),
        );
      }),
    );
  });

  it('refuses more than there are, less than none, and pools beyond its counters', () => {
    for (const [pool, count] of [
      [3, 4],
      [3, -1],
      [2.5, 1],
      [65_536, 1],
    ] as const) {
      expect(() => select(utf8('x'), pool, count)).toThrow(RangeError);
    }
  });
});

describe('fairness over 24,000 draws from fixed seeds', () => {
  const DRAWS = 24_000;
  const POOL = 12;
  const drawn = Array.from({ length: DRAWS }, (_, i) =>
    select(createHash('sha256').update(`fair ${i}`).digest(), POOL, 3).map(({ chosen }) => chosen),
  );
  const chiSquare = (counts: ReadonlyMap<string, number>, cells: number, total: number): number => {
    const expected = total / cells;
    const seen = [...counts.values()].reduce((sum, n) => sum + (n - expected) ** 2 / expected, 0);
    return seen + (cells - counts.size) * expected;
  };
  const tally = (keys: readonly string[]): ReadonlyMap<string, number> => {
    const counts = new Map<string, number>();
    for (const key of keys) counts.set(key, (counts.get(key) ?? 0) + 1);
    return counts;
  };

  // Upper 0.1 % points of the chi-square distribution, Wilson–Hilferty approximation.
  const critical = (freedom: number): number => {
    const a = 2 / (9 * freedom);
    return freedom * (1 - a + 3.0902 * Math.sqrt(a)) ** 3;
  };

  it.each([0, 1, 2])('draws every car equally often in round %i', (round) => {
    const counts = tally(drawn.map((chosen) => String(chosen[round])));
    expect(chiSquare(counts, POOL, DRAWS)).toBeLessThan(critical(POOL - 1));
  });

  it('draws every ordered pair equally often', () => {
    const counts = tally(drawn.map(([first, second]) => `${first} ${second}`));
    const cells = POOL * (POOL - 1);
    expect(chiSquare(counts, cells, DRAWS)).toBeLessThan(critical(cells - 1));
  });

  it('would notice a car drawn one time in ten more often', () => {
    const skewed = drawn.map(([first], i) => (i % 120 === 0 ? '1' : String(first)));
    expect(chiSquare(tally(skewed), POOL, DRAWS)).toBeGreaterThan(critical(POOL - 1));
  });
});
