import { describe, expect, it } from 'vitest';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import type { Clause } from '@/domain/rulebook/clause';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { Requirement } from '@/domain/rulebook/requirement';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { clause, clearance, lift } from './build';

const choice = {
  kind: 'choice',
  subject: 'tappet-type',
  question: 'Which?',
  options: [
    { value: 'flat', label: 'Flat' },
    { value: 'roller', label: 'Roller' },
  ],
  allowed: ['flat'],
  per: 'engine',
} as const satisfies Requirement;

const yesNo = {
  kind: 'yes-no',
  subject: 'bushed',
  question: 'Bushed?',
  required: 'no',
  per: 'bore',
} as const;

const reference = {
  kind: 'reference-average',
  quantity: 'lifter-weight',
  unit: 'g',
  per: 'lifter',
  n: 3,
  plus: { text: '1', unit: 'g' },
  minus: { text: '1', unit: 'g' },
  decisionRule: { kind: 'simple' },
  comparison: { method: 'absolute' },
} as const satisfies Requirement;

const noBounds = { min: undefined, max: undefined };

const requirements: readonly [string, Requirement, string, RegExp][] = [
  [
    'a bare nominal',
    clearance({
      ...noBounds,
      nominal: { size: inches('0.842'), plus: inches('0'), minus: inches('0.000') },
    }),
    '/nominal',
    /bare nominal/,
  ],
  [
    'a nominal beside bounds',
    clearance({ nominal: { size: inches('0.842'), plus: inches('0.001'), minus: inches('0') } }),
    '/nominal',
    /not both/,
  ],
  [
    'a signed tolerance',
    clearance({
      ...noBounds,
      nominal: { size: inches('0.842'), plus: inches('0.001'), minus: inches('-0.001') },
    }),
    '/nominal/minus',
    /without a sign/,
  ],
  ['no limit at all', clearance(noBounds), '', /No limit/],
  [
    'a per-bore limit without its figure',
    clearance({ figure: undefined }),
    '/figure',
    /mean, the smallest or the largest/,
  ],
  ['a lift without datum', lift({ datum: ' ' }), '/datum', /datum/],
  ['a lift without lash', lift({ lash: undefined }), '/lash', /lash/],
  [
    'a lift without checking lifter',
    lift({ checkingLifter: undefined }),
    '/checkingLifter',
    /solid checking lifter/,
  ],
  ['max below min', clearance({ max: inches('0.0012') }), '/max', /below the least/],
  ['max equal to min', clearance({ max: inches('0.00130') }), '/max', /the same/],
  [
    'max below min across units',
    clearance({ max: { text: '0.033', unit: 'mm' } }),
    '/max',
    /below the least/,
  ],
  [
    'a weight for a length',
    clearance({ max: { text: '1', unit: 'lb' } }),
    '/max/unit',
    /"lb" measures a weight; Lifter-bore clearance is a length/,
  ],
  [
    'an unknown unit',
    clearance({ max: { text: '1', unit: 'furlong' } }),
    '/max/unit',
    /no unit known here/,
  ],
  ['results in a wrong unit', clearance({ unit: 'cc' }), '/unit', /measures a volume/],
  ['not a number', clearance({ max: inches('about 0.002') }), '/max/text', /./],
  ['an ambiguous number', clearance({ max: inches('1,234') }), '/max/text', /could be/],
  ['per the wrong part', clearance({ per: 'engine' }), '/per', /per bore, not per engine/],
  [
    'an unknown quantity',
    clearance({ quantity: 'shoe-size' as QuantityName }),
    '/quantity',
    /no quantity of the catalogue/,
  ],
  [
    'a guard band stated twice',
    clearance({ decisionRule: { kind: 'guarded-rejection', guardFactor: '1', probability: 0.95 } }),
    '/decisionRule',
    /not by both/,
  ],
  ['a fitness number of zero', clearance({ fitRatio: '0' }), '/fitRatio', /above zero/],
  [
    'a check on the ring that allows nothing',
    clearance({ ringCheck: inches('0.0000') }),
    '/ringCheck',
    /more than zero/,
  ],
  [
    'two sets of what is worked out from other numbers',
    limit({
      quantity: 'displacement',
      unit: 'in³',
      per: 'engine',
      max: { text: '358.0', unit: 'in³' },
      twoSets: 'each',
    }),
    '/twoSets',
    /worked out from other numbers/,
  ],
  [
    'two sets of a whole car',
    limit({
      quantity: 'car-weight',
      unit: 'lb',
      per: 'car',
      datum: 'with the driver, after the race',
      min: { text: '2600', unit: 'lb' },
      twoSets: 'each',
    }),
    '/twoSets',
    /at the line, once/,
  ],
  [
    'an uncertainty of zero',
    clearance({ maximumUncertainty: inches('0') }),
    '/maximumUncertainty',
    /more than zero/,
  ],
  [
    'a sample of none',
    clearance({ sample: { kind: 'some', count: 0 } }),
    '/sample/count',
    /one or more/,
  ],
  [
    'a step of zero',
    clearance({ rounding: { of: 'limit', direction: 'up', step: inches('0') } }),
    '/rounding/step',
    /more than zero/,
  ],
  [
    'rounding twice',
    clearance({
      rounding: { of: 'measured', direction: 'up', step: inches('0.001') },
      comparison: { method: 'rounded', decimals: 3 },
    }),
    '/comparison',
    /rounded twice/,
  ],
  [
    'half a decimal',
    clearance({ comparison: { method: 'rounded', decimals: 1.5 } }),
    '/comparison/decimals',
    /whole number/,
  ],
  ['one option', { ...choice, options: choice.options.slice(0, 1) }, '/options', /two options/],
  [
    'the same option twice',
    { ...choice, options: [...choice.options, choice.options[0]] },
    '/options',
    /same key/,
  ],
  ['nothing allowed', { ...choice, allowed: [] }, '/allowed', /No option/],
  ['a stranger allowed', { ...choice, allowed: ['steam'] }, '/allowed', /steam/],
  [
    'everything allowed',
    { ...choice, allowed: ['flat', 'roller'] },
    '/allowed',
    /nothing to check/,
  ],
  ['a subject with spaces', { ...yesNo, subject: 'Bushed bore' }, '/subject', /short key/],
  ['an empty question', { ...yesNo, question: '' }, '/question', /question/],
  ['an average of one', { ...reference, n: 1 }, '/n', /at least two/],
  [
    'no room about the average',
    { ...reference, plus: { text: '0', unit: 'g' }, minus: { text: '0', unit: 'g' } },
    '/plus',
    /how far/,
  ],
  [
    'a photograph of nothing',
    { kind: 'photograph', subject: 'a', visible: [] },
    '/visible',
    /visible/,
  ],
  [
    'a sheet without title',
    { kind: 'sheet', subject: 'a', sheet: 'other', title: ' ' },
    '/title',
    /Name/,
  ],
  [
    'half a seal',
    { kind: 'seal', subject: 'a', place: 'pan', count: 0.5 },
    '/count',
    /whole number/,
  ],
  [
    'a plug gauge by weight',
    {
      kind: 'plug-gauge',
      subject: 'a',
      size: { text: '1', unit: 'g' },
      gauge: 'go',
      where: 'the hole',
      per: 'engine',
    },
    '/size/unit',
    /measures a weight/,
  ],
  [
    'a plug gauge nowhere',
    { kind: 'plug-gauge', subject: 'a', size: inches('1'), gauge: 'go', where: '', per: 'engine' },
    '/where',
    /where/,
  ],
];

const clauses: readonly [string, readonly Clause[], string, RegExp][] = [
  ['no clause', [], '/clauses', /at least one/],
  [
    'a number that is none',
    [clause(yesNo, { number: '4.a' })],
    '/clauses/0/number',
    /4\.?|whole numbers/,
  ],
  ['a leading zero', [clause(yesNo, { number: '4.06' })], '/clauses/0/number', /whole numbers/],
  [
    'two of a number',
    [clause(yesNo), clause(clearance())],
    '/clauses/1/number',
    /two clauses 4\.6/,
  ],
  [
    'a reference into nothing',
    [clause(yesNo, { refs: ['9.9'] })],
    '/clauses/0/refs/0',
    /no clause 9\.9/,
  ],
  ['a reference to itself', [clause(yesNo, { refs: ['4.6'] })], '/clauses/0/refs/0', /itself/],
  ['no heading', [clause(yesNo, { heading: ' ' })], '/clauses/0/heading', /heading/],
  ['no words', [clause(yesNo, { words: '' })], '/clauses/0/words', /words/],
  [
    'a mandatory clause that nothing checks',
    [clause(undefined)],
    '/clauses/0/force',
    /judged by the officials/,
  ],
  [
    'a judged clause with a requirement',
    [clause(yesNo, { force: 'judged' })],
    '/clauses/0/force',
    /mandatory or advisory/,
  ],
  [
    'a penalty on advice',
    [clause(clearance(), { force: 'advisory', penaltyRow: 'A' })],
    '/clauses/0/penaltyRow',
    /no penalty/,
  ],
  [
    'a penalty that is not in the schedule',
    [clause(yesNo, { penaltyRow: 'Z' })],
    '/clauses/0/penaltyRow',
    /no row Z/,
  ],
  [
    '"rounded up" that does not say what',
    [clause(clearance(), { words: 'Readings and limits are rounded up.' })],
    '/clauses/0/requirement/rounding',
    /limit or the measured value/,
  ],
  [
    'a term with two meanings',
    [
      clause(yesNo, { definitions: [{ term: 'Foot', meaning: 'one' }] }),
      clause(clearance(), { number: '5', definitions: [{ term: 'foot', meaning: 'two' }] }),
    ],
    '/clauses/1/definitions/0',
    /defined twice/,
  ],
  [
    'a subject asked in two ways',
    [clause(yesNo), clause({ ...yesNo, per: 'engine' }, { number: '5' })],
    '/clauses/1/requirement/subject',
    /other answers/,
  ],
];

describe('a rulebook that cannot be published', () => {
  it.each(requirements)('%s', (_, requirement, place, words) => {
    const faults = findAmbiguities([clause(requirement)]);
    expect(faults.map((fault) => fault.pointer)).toContain(`/clauses/0/requirement${place}`);
    const fault = faults.find((row) => row.pointer === `/clauses/0/requirement${place}`);
    expect(fault?.detail).toMatch(words);
  });

  it.each(clauses)('%s', (_, rows, pointer, words) => {
    const fault = findAmbiguities(rows, [
      { row: 'A', breach: 'x', penalties: ['y'], carriesOver: false },
    ]).find((row) => row.pointer === pointer);
    expect(fault?.detail).toMatch(words);
  });
});

describe('a rulebook that can be published', () => {
  it.each([
    ['clearance', clearance()],
    ['lift', lift()],
    ['choice', choice],
    ['yes-no', yesNo],
    ['reference', reference],
    [
      'nominal with a one-sided tolerance',
      clearance({
        ...noBounds,
        nominal: { size: inches('0.842'), plus: inches('0.0005'), minus: inches('0') },
      }),
    ],
  ] as const)('%s', (_, requirement) => {
    expect(findAmbiguities([clause(requirement)])).toEqual([]);
  });

  it('says what "rounded up" rounds', () => {
    const words = 'The limit is rounded up to a thousandth.';
    const rounding = { of: 'limit', direction: 'up', step: inches('0.001') } as const;
    expect(findAmbiguities([clause(clearance({ rounding }), { words })])).toEqual([]);
  });

  it.each([TAPPET_RULE_SET, ENGINE_RULE_SET, WEIGHTS_RULE_SET])('the $title rule set', (set) => {
    expect(findAmbiguities(set.clauses, set.penalties)).toEqual([]);
    const numbers = set.clauses.map((row) => row.number);
    expect(set.notes.filter((note) => !numbers.includes(note.clause))).toEqual([]);
    const limits = set.clauses.filter((row) => row.requirement?.kind === 'limit');
    const noted = set.notes.map((note) => note.clause);
    expect(limits.filter((row) => !noted.includes(row.number))).toEqual([]);
  });
});
