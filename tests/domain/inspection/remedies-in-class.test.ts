import { describe, expect, it } from 'vitest';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import { remediesInClass } from '@/domain/inspection/remedies-in-class';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { Clause } from '@/domain/rulebook/clause';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { body, inches, RULES, reading, record, TWIN } from './build';

const loose = [body('r1', '0.8423'), reading('r3', '0.8444')];

const found = (more: Partial<InspectionRecord> = {}) => {
  const { rules } = record(more);
  const { facts, findings } = assessInspection(record({ readings: loose, ...more }));
  const clearance = rules.clauses.find(({ number }) => number === '4.6');
  if (clearance === undefined) throw new Error('no clearance clause');
  return remediesInClass(clearance, { clauses: rules.clauses, results: findings }, facts);
};

const told = (bores: ReturnType<typeof found>) =>
  bores.map(({ position, remedies }) => [
    position,
    ...remedies.map(({ kind, allowed, clause, from, to }) =>
      [kind, allowed, clause, from?.text, to?.text].join(' '),
    ),
  ]);

const without = (...numbers: readonly string[]) => ({
  rules: { ...RULES, clauses: RULES.clauses.filter((one) => !numbers.includes(one.number)) },
});

// Sizes by the brief definitions: lifter 0.8423, bore 0.8444, window 0.0013 to 0.0019 in (common practice).
describe('remedies in a class', () => {
  it('names each with its size, whether the class allows it and by which clause', () => {
    expect(told(found())).toEqual([
      [
        '1 intake',
        'another-lifter true 4.2 0.8425 0.8431',
        'bush-back false 4.4 0.8436 0.8442',
        'next-nominal-size false 4.2 0.8763 0.8769',
      ],
    ]);
  });

  it('allows another lifter only where some size of its range is within the class', () => {
    const far = [body('r1', '0.8423'), reading('r3', '0.8460')];
    expect(told(found({ readings: far }))[0]?.[1]).toBe('another-lifter false 4.2 0.8441 0.8447');
  });

  it('says so where no clause speaks of it', () => {
    expect(told(found(without('4.2', '4.4')))[0]?.slice(1)).toEqual([
      'another-lifter   0.8425 0.8431',
      'bush-back   0.8436 0.8442',
      'next-nominal-size   0.8763 0.8769',
    ]);
  });

  it('allows bushing under a waiver for this car', () => {
    const waiver = {
      number: 1,
      clause: '4.4',
      words: 'May run bushed bores to the end of the season.',
      for: { kind: 'car', carNumber: '12J' },
    } as unknown as (typeof RULES.waivers)[number];
    const rules = { ...RULES, waivers: [waiver] };
    expect(told(found({ rules }))[0]?.[2]).toBe('bush-back true 4.4 0.8436 0.8442');
  });

  it('says nothing of a bore within its window, nor of one whose lifter has no size', () => {
    expect(found({ readings: [body('r1', '0.8423'), reading('r3', '0.8440')] })).toEqual([]);
    expect(found({ readings: [reading('r3', '0.8444')] })).toEqual([]);
  });

  it('gives the same for what is declared', () => {
    const clearance = RULES.clauses.find(({ number }) => number === '4.6') as Clause;
    const facts = declaredFacts({
      engine: { layout: TWIN },
      answers: [],
      photographs: [],
      files: [],
      sheets: [
        {
          subject: 'lifter-sheet',
          readings: [
            ['lifter-body-diameter', '0.8423'],
            ['tappet-bore-diameter', '0.8444'],
          ].map(([quantity, text]) => ({
            quantity,
            position: '1 intake',
            value: inches(text ?? ''),
          })),
        },
      ],
    } as unknown as Parameters<typeof declaredFacts>[0]);
    const results = evaluateRules(RULES, facts, {});
    const declared = remediesInClass(clearance, { clauses: RULES.clauses, results }, facts);
    expect(told(declared)).toEqual(told(found()));
  });
});
