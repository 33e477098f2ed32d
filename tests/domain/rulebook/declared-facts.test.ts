import { describe, expect, it } from 'vitest';
import { type DeclaredNumber, declaredFacts } from '@/domain/rulebook/evaluate/declared-facts';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { inches } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { tryRules } from '@/domain/rulebook/trial/try-rules';
import { bores } from './build';

const row = (
  position: string,
  body: string,
  foot: string,
  bore: string,
): readonly DeclaredNumber[] => [
  { quantity: 'lifter-body-diameter', position, value: inches(body) },
  { quantity: 'foot-diameter', position, value: inches(foot) },
  { quantity: 'tappet-bore-diameter', position, value: { text: bore, unit: '' } },
];

const declare = (numbers: readonly DeclaredNumber[], type = 'flat') =>
  declaredFacts({
    positions: {
      bores: bores('1 intake', '1 exhaust'),
      cylinders: [{ key: '1', label: 'Cylinder 1' }],
    },
    answers: [
      { subject: 'tappet-type', position: 'engine', answer: type },
      { subject: 'bore-bushed', position: 'engine', answer: 'no' },
      { subject: 'block-casting-number', position: 'engine', answer: ' ' },
    ],
    numbers,
    evidence: ['lifters-racked'],
  });

const sound = [
  ...row('1 intake', '0.8423', '0.8424', '0.8440'),
  ...row('1 exhaust', '0.8422', '0.8420', '0.8440'),
];
const rules = { clauses: TAPPET_RULE_SET.clauses, waivers: [] };
const passes = (numbers: readonly DeclaredNumber[], type?: string) => {
  const facts = declare(numbers, type);
  if (!facts.ok) throw new Error(facts.failure.detail);
  return Object.fromEntries(
    evaluateRules(rules, facts.value, {}).map((result) => [result.clause, result.pass]),
  );
};

describe('a declaration', () => {
  it('is checked against every clause before the event', () => {
    expect(passes(sound)).toEqual({
      '3.1': null,
      '3.2': null,
      '4.1': true,
      '4.2': true,
      '4.3': true,
      '4.4': true,
      '4.5': null,
      '4.6': true,
      '5.1': true,
      '5.2': null,
      '6': null,
    });
  });

  it('fails where it declares what is not allowed', () => {
    const big = [
      ...row('1 intake', '0.8423', '0.8450', '0.8460'),
      ...row('1 exhaust', '0.8750', '0.8750', '0.8767'),
    ];
    expect(passes(big, 'roller')).toMatchObject({
      '4.1': false,
      '4.2': false,
      '4.3': false,
      '4.6': null,
    });
  });

  it('works clearance and foot out exactly, and leaves blank cells open', () => {
    const facts = declare([...row('1 intake', '0.8422', '', '0.8440')]);
    if (!facts.ok) throw new Error(facts.failure.detail);
    const found = facts.value.numbers.map((fact) => [
      fact.quantity,
      fact.position,
      fact.value.text,
    ]);
    expect(found).toContainEqual(['tappet-clearance', '1 intake', '0.0018']);
    expect(found.some(([quantity]) => quantity === 'foot-less-body')).toBe(false);
  });

  it('names each number that cannot be read', () => {
    const facts = declare([
      { quantity: 'lifter-body-diameter', position: '1 intake', value: inches('0.84x') },
      { quantity: 'foot-diameter', position: '1 intake', value: { text: '0.842', unit: 'lb' } },
      { quantity: 'foot-diameter', position: '1 exhaust', value: { text: '21.39', unit: 'mm' } },
    ]);
    expect(facts.ok ? [] : facts.failure.faults?.map((fault) => fault.pointer)).toEqual([
      '/numbers/0/value',
      '/numbers/1/value',
    ]);
  });
});

describe('a trial of rules', () => {
  const cases = [
    sound,
    [
      ...row('1 intake', '0.8423', '0.8430', '0.8440'),
      ...row('1 exhaust', '0.8422', '0.8422', '0.8440'),
    ],
  ].map((numbers, i) => {
    const facts = declare(numbers);
    if (!facts.ok) throw new Error(facts.failure.detail);
    return { id: `e${i}`, name: `Engine ${i}`, bearer: {}, facts: facts.value };
  });
  const stricter = {
    ...rules,
    clauses: rules.clauses.map((clause) =>
      clause.number === '4.3' && clause.requirement?.kind === 'limit'
        ? { ...clause, requirement: { ...clause.requirement, max: inches('0.0005') } }
        : clause,
    ),
  };

  it('lists the engines that a change would make illegal', () => {
    expect(tryRules(rules, cases).sentence).toBe('This would fail 0 of 2 engines.');
    const trial = tryRules(stricter, cases, rules);
    expect(trial.sentence).toBe('This would fail 1 of 2 engines.');
    expect(trial.failed.map((row) => [row.id, row.results.map((result) => result.clause)])).toEqual(
      [['e1', ['4.3']]],
    );
  });

  it('does not list what failed already', () => {
    expect(tryRules(stricter, cases, stricter).failed).toEqual([]);
  });
});
