import { describe, expect, it } from 'vitest';
import { oneWay } from '@/domain/statistics/one-way';
import { summary } from '@/domain/statistics/summary';
import { checkValue, correctDigits, provenance } from '../../support/check-value';

const repeat = (first: string, pair: readonly string[], pairs: number): string[] => [
  first,
  ...Array.from({ length: pairs }, () => pair).flat(),
];

/** π − 3 and on by Gibbons' spigot, so that the digits are computed and not copied. */
function piDigits(count: number): number[] {
  let [q, r, t, k, m, x] = [1n, 0n, 1n, 1n, 3n, 3n];
  const digits: number[] = [];
  while (digits.length < count) {
    if (4n * q + r - t < m * t) {
      digits.push(Number(m));
      [q, r, m] = [10n * q, 10n * (r - m * t), (10n * (3n * q + r)) / t - 10n * m];
    } else {
      [q, r, t, k, m, x] = [
        q * k,
        (2n * q + r) * x,
        t * x,
        k + 1n,
        (q * (7n * k + 2n) + r * x) / (t * x),
        x + 2n,
      ];
    }
  }
  return digits;
}

/** The certified file carries one misprinted digit, and its certified values belong to the file. */
const piFile = () => piDigits(5000).map((digit, i) => (i === 956 ? '3' : String(digit)));

const univariate: Record<string, () => string[]> = {
  'nist-PiDigits': piFile,
  'nist-NumAcc2': () => repeat('1.2', ['1.1', '1.3'], 500),
  'nist-NumAcc3': () => repeat('1000000.2', ['1000000.1', '1000000.3'], 500),
};

describe('NIST StRD, univariate', () => {
  for (const name of [
    'Michelso',
    'Mavro',
    'Lew',
    'Lottery',
    'PiDigits',
    'NumAcc1',
    'NumAcc2',
    'NumAcc3',
  ]) {
    const check = checkValue(`nist-${name}`);
    it(`${name}: mean, standard deviation and lag-1 to 14.5 digits or more (${provenance(check)})`, () => {
      const values =
        univariate[check.id]?.() ?? (check.inputs['data'] as number[]).map((x) => String(x));
      expect(values).toHaveLength(check.inputs['n'] as number);
      const found = summary(values);
      const { mean, sd, r1 } = check.expected as { mean: number; sd: number; r1: number };
      expect(correctDigits(found.mean, mean)).toBeGreaterThan(14.5);
      expect(correctDigits(found.standardDeviation, sd)).toBeGreaterThan(14.5);
      expect(correctDigits(found.lag1 ?? 0, r1)).toBeGreaterThan(14.5);
    });
  }

  it('a constructed set with seven figures before the point keeps every digit (NumAcc4: 10000000.2 then 10000000.1, .3; mean 10000000.2, sd 0.1, r1 −0.999; from memory)', () => {
    const found = summary(repeat('10000000.2', ['10000000.1', '10000000.3'], 500));
    expect(found).toEqual({ n: 1001, mean: 10000000.2, standardDeviation: 0.1, lag1: -0.999 });
  });
});

const centresOf = (note: string) => {
  const found = /n=(\d+), centres=(\[.*?\])/.exec(note);
  const list = JSON.parse((found?.[2] ?? '[]').replaceAll("'", '"')) as string[];
  return { n: Number(found?.[1]), centres: list };
};

describe('NIST StRD, one-way analysis of variance', () => {
  for (const name of [
    'SiRstv',
    'SmLs01',
    'SmLs02',
    'SmLs03',
    'SmLs04',
    'SmLs05',
    'SmLs06',
    'SmLs07',
    'SmLs09',
    'AtmWtAg',
  ]) {
    const check = checkValue(`nist-${name}`);
    it(`${name}: sums of squares and F to 14.5 digits or more (${provenance(check)})`, () => {
      const groups =
        typeof check.inputs['data'] === 'string'
          ? generated(check.note ?? '')
          : Object.values(check.inputs['data'] as Record<string, string[]>);
      const found = oneWay(groups);
      const certified = check.expected as Record<string, number>;
      expect(found.dfBetween).toBe(certified['df_between']);
      expect(found.dfWithin).toBe(certified['df_within']);
      expect(correctDigits(found.ssBetween, certified['SSB'] ?? 0)).toBeGreaterThan(14.5);
      expect(correctDigits(found.ssWithin, certified['SSW'] ?? 0)).toBeGreaterThan(14.5);
      expect(correctDigits(found.F ?? 0, certified['F'] ?? 0)).toBeGreaterThan(14.5);
    });
  }
});

/** The files' own recipe: each treatment is its centre, then the pair a tenth below and above, repeated. */
function generated(note: string): string[][] {
  const { n, centres } = centresOf(note);
  expect(centres).toHaveLength(9);
  return centres.map((centre) => {
    const [whole = '', tenth = ''] = centre.split('.');
    const at = (step: number) => `${whole}.${Number(tenth) + step}`;
    return repeat(centre, [at(-1), at(1)], (n - 1) / 2);
  });
}
