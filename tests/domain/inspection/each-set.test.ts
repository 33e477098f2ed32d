import { describe, expect, it } from 'vitest';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import { planOf } from '@/domain/inspection/plan/plan';
import { secondFrom, secondQuery } from '@/domain/inspection/second-set/asked';
import { secondSetsWanted, withOthers } from '@/domain/inspection/second-set/wanted';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { body, exhaust, intake, RULES, reading, record, remark, TWIN } from './build';

/** Clause 4.2, body 0.8420 in +0.0006 −0.0004, with each set by itself. */
const EACH: RulesInForce = {
  ...RULES,
  clauses: RULES.clauses.map((clause) =>
    clause.requirement?.kind === 'limit' && ['4.2', '4.6'].includes(clause.number)
      ? {
          ...clause,
          force: 'mandatory',
          requirement: { ...clause.requirement, twoSets: 'each' },
        }
      : clause,
  ),
};

const found = (more: Partial<InspectionRecord>) => {
  const assessment = assessInspection(record({ rules: EACH, ...more }));
  const at = (clause: string, position = '1 intake') =>
    assessment.findings
      .find((one) => one.clause === clause)
      ?.perPosition.find((one) => one.position === position);
  return { assessment, at };
};

const twice = (first: string, second: string) => [
  body('b1', first),
  body('b11', second, { set: 2, takenBy: 'other' }),
];

describe('sets that each stand by themselves', () => {
  it.each([
    ['0.8430', '0.8430', 'outside', false],
    ['0.8430', '0.8429', 'outside', false],
    ['0.8430', '0.8421', 'no-statement', null],
    ['0.8422', '0.8422', 'within', true],
  ] as const)('%s and %s in come to %s', (first, second, state, pass) => {
    expect(found({ readings: twice(first, second) }).at('4.2')).toMatchObject({ state, pass });
  });

  it('one set that shows a breach states none, asks the full sheet, and wants a second there alone', () => {
    const readings = [body('b1', '0.8430'), body('b2', '0.8421', { place: exhaust })];
    const { assessment, at } = found({ readings });
    expect(at('4.2')).toMatchObject({ state: 'no-statement', wants: 'second-set' });
    expect(secondSetsWanted(assessment)).toEqual([{ bore: '1 intake', set: 2 }]);
    const asks = planOf(EACH, assessment, { advice: false }).filter(
      ({ quantity }) => quantity === 'lifter-body-diameter',
    );
    expect(Object.fromEntries(asks.map(({ position, extent }) => [position, extent]))).toEqual({
      '1 exhaust': 'one',
      '1 intake': 'full',
    });
  });

  it('sets that differ want one more, and a person’s choice of one states no breach', () => {
    const stands = remark('c20', 'second-set', {
      place: intake,
      answer: { value: '1' },
      reason: 'The second slipped.',
    });
    const readings = twice('0.8430', '0.8421');
    const { assessment, at } = found({ readings, remarks: [stands] });
    expect(at('4.2')).toMatchObject({ state: 'no-statement', pass: null, wants: 'new-set' });
    expect(secondSetsWanted(assessment)).toEqual([{ bore: '1 intake', set: 3 }]);
    // Read again, and the one that was wrong struck with its reason: both of the others count.
    const third = body('b21', '0.8430', { set: 3, takenBy: 'other' });
    const strike = remark('c22', 'strike', { readingId: 'b11', reason: 'gauge-slipped' });
    expect(found({ readings: [...readings, third] }).at('4.2')?.pass).toBeNull();
    expect(
      found({ readings: [...readings, third], remarks: [stands, strike] }).at('4.2'),
    ).toMatchObject({ state: 'outside', pass: false });
  });

  it('a lifter taken over from the first set is no second set of the lifter', () => {
    const readings = [
      body('b1', '0.8430'),
      reading('r2', '0.8440'),
      reading('r13', '0.8440', { set: 2 }),
    ];
    const { at } = found({ readings });
    expect(at('4.2')).toMatchObject({ state: 'no-statement', wants: 'second-set' });
    // The clearance was read twice: 0.0010 in, under the least of 0.0013 in by both.
    expect(at('4.6')).toMatchObject({ state: 'outside', pass: false });
    expect(at('4.6')?.sets).toHaveLength(2);
  });

  it('without the field the same readings are pooled as before', () => {
    const pooled = assessInspection(record({ readings: twice('0.8430', '0.8429') }));
    const intakeResult = pooled.findings
      .find(({ clause }) => clause === '4.2')
      ?.perPosition.find(({ position }) => position === '1 intake');
    expect(intakeResult?.exact).toEqual({ text: '0.84295', unit: 'in' });
    expect(intakeResult).not.toHaveProperty('sets');
  });
});

describe('the bores of an independent set', () => {
  it('are those where it is wanted, the chosen one first, and travel in the address', () => {
    const wanted = [
      { bore: '1 exhaust', set: 2 },
      { bore: '1 intake', set: 2 },
    ];
    const asked = withOthers(wanted, { bore: '1 intake', set: 2 });
    expect(asked).toEqual({ bores: ['1 intake', '1 exhaust'], set: 2 });
    expect(withOthers(wanted, { bore: '1 intake', set: 3 }).bores).toEqual(['1 intake']);
    const query = new URLSearchParams(secondQuery(asked));
    expect(secondFrom(TWIN, { bores: query.getAll('second'), set: query.get('set') })).toEqual(
      asked,
    );
    const third = new URLSearchParams(secondQuery({ bores: ['1 intake'], set: 3 }));
    expect(secondFrom(TWIN, { bores: third.getAll('second'), set: third.get('set') })).toEqual({
      bores: ['1 intake'],
      set: 3,
    });
  });

  it.each([
    [[], null],
    [['9 intake', ''], '2'],
  ])('%j is none of this engine', (bores, set) => {
    expect(secondFrom(TWIN, { bores, set })).toBeUndefined();
  });

  it('a number that is no set is the second', () => {
    expect(secondFrom(TWIN, { bores: ['1 intake', '1 intake'], set: '1' })).toEqual({
      bores: ['1 intake'],
      set: 2,
    });
  });
});
