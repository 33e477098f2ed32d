import { describe, expect, it } from 'vitest';
import { requirementWords } from '@/domain/rulebook/describe';
import { evaluateClause } from '@/domain/rulebook/evaluate/evaluate-clause';
import type { NumberFact, SetNumber } from '@/domain/rulebook/evaluate/facts';
import type { LimitRequirement } from '@/domain/rulebook/limit';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { bores, clause, facts, quantity, TENTH } from './build';

/** At most 0.8426 in; a breach is shown beyond one whole U. */
const body = (more: Partial<LimitRequirement> = {}): LimitRequirement =>
  limit({
    quantity: 'lifter-body-diameter',
    unit: 'in',
    per: 'lifter',
    figure: 'mean',
    max: inches('0.8426'),
    decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
    ...more,
  });

const each = body({ twoSets: 'each' });

/** Tenths of a thousandth over 0.8400 in, and a standard uncertainty in tenths. */
interface Read {
  readonly tenths: number;
  readonly u: number;
}

const sizeOf = (tenths: number) => `0.84${String(tenths).padStart(2, '0')}`;

const setOf = ({ tenths, u }: Read, at: number): SetNumber => ({
  set: at + 1,
  value: quantity('lifter-body-diameter', sizeOf(tenths)),
  standardUncertainty: u * TENTH,
});

const factOf = (reads: readonly Read[], more: Partial<NumberFact> = {}): NumberFact => {
  const sets = reads.map(setOf);
  const [first] = sets;
  if (first === undefined) throw new Error('no set');
  const mean = reads.reduce((sum, { tenths }) => sum + tenths, 0) / reads.length;
  return {
    quantity: 'lifter-body-diameter',
    position: '1I',
    figure: 'mean',
    value: quantity('lifter-body-diameter', `${0.84 + mean / 10_000}`),
    standardUncertainty: Math.max(...sets.map((set) => set.standardUncertainty)),
    ...(sets.length < 2 ? {} : { sets }),
    ...more,
  };
};

const resultOf = (
  rule: LimitRequirement,
  reads: readonly Read[],
  {
    advisory = false,
    origin = 'found' as 'found' | 'declared',
    ...more
  }: Partial<NumberFact> & { advisory?: boolean; origin?: 'found' | 'declared' } = {},
) => {
  const [result] = evaluateClause(
    clause(rule, { force: advisory ? 'advisory' : 'mandatory' }),
    facts({
      origin,
      positions: { bores: bores('1I'), cylinders: [] },
      numbers: [factOf(reads, more)],
    }),
  ).perPosition;
  if (result === undefined) throw new Error('no result');
  return result;
};

const at = (tenths: number, u = 0.5): Read => ({ tenths, u });

describe('a clause that holds each of two sets by itself', () => {
  it.each([
    ['one set clearly within', [at(22)], 'within', true, undefined],
    ['one set too close to call', [at(26)], 'too-close', true, 'second-set'],
    ['one set outside: a breach wants two', [at(30)], 'no-statement', null, 'second-set'],
    ['both within', [at(22), at(23)], 'within', true, undefined],
    ['both outside', [at(30), at(31)], 'outside', false, undefined],
    ['one outside, one too close', [at(28), at(27, 0.6)], 'too-close', null, undefined],
    ['one within, one too close', [at(24), at(25, 0.6)], 'too-close', true, undefined],
    ['both outside, and apart', [at(28), at(31)], 'no-statement', null, 'new-set'],
    ['one within, one outside, apart', [at(22), at(30)], 'no-statement', null, 'new-set'],
    ['three, all outside', [at(30), at(30), at(31)], 'outside', false, undefined],
    ['three, one apart', [at(30), at(30), at(26)], 'no-statement', null, 'new-set'],
  ] as const)('%s', (_words, reads, state, pass, wants) => {
    const result = resultOf(each, reads);
    expect([result.state, result.pass, result.wants]).toEqual([state, pass, wants]);
  });

  it('states no breach that only the mean of both would show', () => {
    const reads = [at(27, 0.6), at(28, 0.6)];
    expect(resultOf(body(), reads)).toMatchObject({ state: 'outside', pass: false });
    expect(resultOf(each, reads)).toMatchObject({ state: 'too-close', pass: null });
  });

  it('says it in the plain sentence, each set with its U, and in the rule', () => {
    const result = resultOf(each, [at(31), at(30)]);
    expect(result.sentence).toBe(
      'Bore 1I: mean, set 1 0.8431 in ± 0.00010 in, set 2 0.8430 in ± 0.00010 in; at most 0.8426 in, each set by itself: outside.',
    );
    expect(result.rule).toContain('each is held against the limit by itself');
    expect(resultOf(each, [at(30)]).sentence).toContain(
      'no statement, since one set alone shows a breach and this clause wants a second',
    );
    expect(resultOf(each, [at(28), at(31)]).sentence).toContain(
      'the sets differ by more than their joint uncertainty; measure again',
    );
    expect(requirementWords(each)).toContain(
      'a breach is stated only when two independent sets each show it',
    );
    expect(requirementWords(body())).not.toContain('sets');
  });

  it('shows the set that speaks most for the competitor, and keeps each in full', () => {
    const result = resultOf(each, [at(31), at(30)]);
    expect(result.exact).toEqual(inches('0.8430'));
    expect(result.sets).toEqual([
      expect.objectContaining({ set: '1', state: 'outside', exact: inches('0.8431') }),
      expect.objectContaining({ set: '2', state: 'outside', exact: inches('0.8430') }),
    ]);
    expect(resultOf(each, [at(22), at(23)]).exact).toEqual(inches('0.8422'));
  });

  it('keeps a gauge that cannot support a breach from stating one, in either set', () => {
    const more = { cannotSupportBreach: 'gauge MC-01 was overdue for calibration' };
    for (const reads of [[at(30)], [at(30), at(31)]]) {
      const result = resultOf(each, reads, more);
      expect(result).toMatchObject({ state: 'no-statement', pass: null });
      expect(result.sentence).toContain('was overdue for calibration');
    }
  });

  it('warns only, where it is advisory', () => {
    expect(resultOf(each, [at(30), at(31)], { advisory: true })).toMatchObject({
      state: 'outside',
      pass: null,
    });
    expect(resultOf(each, [at(30)], { advisory: true }).state).toBe('no-statement');
  });

  it('holds a declaration as one statement', () => {
    expect(resultOf(each, [at(30)], { origin: 'declared', standardUncertainty: 0 })).toMatchObject({
      state: 'outside',
      pass: false,
    });
  });

  it('left out, nothing of a result changes', () => {
    const reads = [at(30), at(31)];
    const { sets: _sets, ...without } = factOf(reads);
    const plain = resultOf(body(), reads, { ...without, sets: undefined });
    expect(JSON.stringify(resultOf(body(), reads))).toBe(JSON.stringify(plain));
    expect(Object.keys(plain)).not.toContain('sets');
    expect(Object.keys(plain)).not.toContain('wants');
  });
});

/** Two-sided 95 % of the normal distribution, from tables. */
const K = 1.959963984540054;
const MAX = 26;

/** The same by plain arithmetic in tenths: nothing of it is the product's. */
const byHand = (reads: readonly Read[]) => {
  const kinds = reads.map(({ tenths, u }) =>
    tenths - MAX > K * u ? 'outside' : MAX - tenths > K * u ? 'within' : 'too-close',
  );
  const apart = reads.some((a) =>
    reads.some((b) => Math.abs(a.tenths - b.tenths) > K * Math.hypot(a.u, b.u)),
  );
  const breaches = kinds.filter((kind) => kind === 'outside').length;
  const alike = new Set(kinds).size === 1;
  if (reads.length === 1) {
    if (breaches === 1) return ['no-statement', null, 'second-set'];
    return [kinds[0], true, kinds[0] === 'too-close' ? 'second-set' : undefined];
  }
  if (apart) return ['no-statement', null, 'new-set'];
  if (breaches === reads.length) return ['outside', false, undefined];
  if (breaches > 0) return ['too-close', null, undefined];
  return [alike ? kinds[0] : 'too-close', true, undefined];
};

describe('by a second route', () => {
  it('every pair of sets from 0.8420 to 0.8432 in with three uncertainties comes to the same', () => {
    const us = [0.3, 0.5, 0.9];
    const sizes = Array.from({ length: 13 }, (_, i) => 20 + i);
    const reads = sizes.flatMap((tenths) => us.map((u) => ({ tenths, u })));
    const cases = [...reads.map((one) => [one]), ...reads.flatMap((a) => reads.map((b) => [a, b]))];
    const seen = new Map<string, number>();
    for (const one of cases) {
      const { state, pass, wants } = resultOf(each, one);
      const words = one.map(({ tenths, u }) => `${sizeOf(tenths)} u ${u}`).join(', ');
      expect([words, state, pass, wants]).toEqual([words, ...byHand(one)]);
      seen.set(state, (seen.get(state) ?? 0) + 1);
    }
    expect(cases).toHaveLength(39 + 39 * 39);
    expect([...seen.keys()].sort()).toEqual(['no-statement', 'outside', 'too-close', 'within']);
  });
});
