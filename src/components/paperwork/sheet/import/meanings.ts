import type { ColumnMeaning } from '@/domain/paperwork/sheet/header/column-meaning';
import { unitIn } from '@/domain/paperwork/sheet/header/read-header';
import { unitSymbols } from '@/domain/quantity/find-unit';
import type { SheetForm } from '@/domain/rulebook/form/form';
import { getQuantityEntry, isQuantityName } from '@/domain/rulebook/quantity-catalogue';

/** What a person can say that a column holds: the select's value and its words. */
export interface MeaningOption {
  readonly value: string;
  readonly words: string;
}

type Reading = Extract<ColumnMeaning, { kind: 'reading' }>;

const optionFor = (quantity: string, valve: string): string =>
  `reading ${quantity} ${valve}`.trim();

/** The select's value for what a column holds now. */
export const optionOf = (meaning: ColumnMeaning): string =>
  meaning.kind === 'reading' ? optionFor(meaning.quantity, meaning.valve ?? '') : meaning.kind;

/** Every choice for this sheet; a reading of one valve where a row can be a cylinder. */
export const meaningOptions = (form: SheetForm): readonly MeaningOption[] => {
  const byBore = form.per === 'bore' || form.per === 'lifter';
  const byDegree = form.per === 'degree';
  const readings = form.columns.flatMap(({ quantity, label }) => [
    ...(byDegree ? [] : [{ value: optionFor(quantity, ''), words: label }]),
    ...(byBore || byDegree
      ? [
          { value: optionFor(quantity, 'intake'), words: `${label}, intake` },
          { value: optionFor(quantity, 'exhaust'), words: `${label}, exhaust` },
        ]
      : []),
  ]);
  return [
    { value: 'not-taken', words: 'nothing for this sheet' },
    ...readings,
    ...(byBore ? [{ value: 'position', words: 'which bore, such as 3 intake' }] : []),
    ...(byDegree
      ? [{ value: 'position', words: 'the crankshaft angle, in degrees' }]
      : [{ value: 'cylinder', words: 'the cylinder’s number' }]),
    ...(byBore ? [{ value: 'valve', words: 'intake or exhaust' }] : []),
  ];
};

/** Where in a bore or on a lifter several readings were taken. */
export const SPOTS: readonly MeaningOption[] = [
  { value: '', words: 'one reading a place' },
  ...['above', 'below', 'above along', 'above across', 'below along', 'below across'].map(
    (words) => ({ value: words, words }),
  ),
];

/** Without the number that tells repeats apart: it is given anew with each reading. */
const withoutRepeat = (axis: string): string => axis.replace(/ ?\d+$/, '');

export const spotOf = ({ depth, axis }: Reading): string =>
  `${depth} ${withoutRepeat(axis)}`.trim();

export const withUnit = (meaning: Reading, unit: string): ColumnMeaning => ({
  ...meaning,
  unit,
  axis: withoutRepeat(meaning.axis),
});

export const withSpot = (meaning: Reading, spot: string): ColumnMeaning => {
  const [depth = '', axis = ''] = spot.split(' ');
  return { ...meaning, depth, axis };
};

export const unitsOf = ({ quantity }: Reading): readonly string[] =>
  unitSymbols(getQuantityEntry(quantity).dimension);

/** What the choice means; a reading is in the unit that its heading names, else in the rules’ own. */
export const meaningFor = (option: string, form: SheetForm, header = ''): ColumnMeaning => {
  const [kind, quantity = '', valve] = option.split(' ');
  if (kind === 'position' || kind === 'cylinder' || kind === 'valve') return { kind };
  if (kind !== 'reading' || !isQuantityName(quantity)) return { kind: 'not-taken' };
  const column = form.columns.find((one) => one.quantity === quantity);
  const unit = unitIn(header, quantity) ?? column?.unit ?? getQuantityEntry(quantity).unit;
  const meaning = { kind, quantity, unit, depth: '', axis: '' } as const;
  return valve === 'intake' || valve === 'exhaust' ? { ...meaning, valve } : meaning;
};
