import { limit, PENALTIES, type RuleSet, text } from './rule-set';

const grams = (value: string) => ({ text: value, unit: 'g' });
const pounds = (value: string) => ({ text: value, unit: 'lb' });

/** Least weights of the car and of moving parts. */
export const WEIGHTS_RULE_SET: RuleSet = {
  id: 'weights',
  title: 'Weights',
  about: 'Least weights of the car, crankshaft, rods, pistons and lifters.',
  penalties: PENALTIES,
  clauses: [
    text('1', 'Scales', 'Weights are read on the series’ scales, certified within twelve months.'),
    {
      number: '2',
      heading: 'Car',
      words: 'The car weighs at least 2,800 lb after the race, driver aboard, nothing added.',
      force: 'mandatory',
      penaltyRow: 'A',
      requirement: limit({
        quantity: 'car-weight',
        unit: 'lb',
        per: 'car',
        datum: 'after the race, driver aboard, nothing added',
        min: pounds('2800'),
        decisionRule: { kind: 'simple' },
      }),
    },
    text('3', 'Parts', 'Parts are weighed clean and dry.'),
    {
      number: '3.1',
      heading: 'Crankshaft',
      words: 'The bare crankshaft weighs at least 50.0 lb.',
      force: 'mandatory',
      penaltyRow: 'A',
      requirement: limit({
        quantity: 'crankshaft-weight',
        unit: 'lb',
        per: 'engine',
        min: pounds('50.0'),
      }),
    },
    {
      number: '3.2',
      heading: 'Connecting rods',
      words: 'Each rod with bolts and cap, without bearings, weighs at least 560 g.',
      force: 'mandatory',
      penaltyRow: 'A',
      requirement: limit({
        quantity: 'connecting-rod-weight',
        unit: 'g',
        per: 'cylinder',
        sample: { kind: 'some', count: 2 },
        min: grams('560'),
      }),
    },
    {
      number: '3.3',
      heading: 'Piston assemblies',
      words: 'Piston, pin, rings and locks of a cylinder weigh at least 600 g together.',
      force: 'mandatory',
      penaltyRow: 'A',
      requirement: limit({
        quantity: 'piston-assembly-weight',
        unit: 'g',
        per: 'cylinder',
        sample: { kind: 'some', count: 2 },
        min: grams('600'),
      }),
    },
    {
      number: '3.4',
      heading: 'Lifters',
      words: 'Each lifter of a sample of four weighs at least 82.0 g.',
      force: 'mandatory',
      penaltyRow: 'A',
      requirement: limit({
        quantity: 'lifter-weight',
        unit: 'g',
        per: 'lifter',
        sample: { kind: 'some', count: 4 },
        min: grams('82.0'),
        maximumUncertainty: grams('0.5'),
      }),
    },
  ],
  notes: ['2', '3.1', '3.2', '3.3', '3.4'].map((clause) => ({
    clause,
    note: 'example, to be set by the series',
  })),
};
