import { largest, mean, type Series, smallest } from '../../measurement/series';
import { combine, type UncertaintyComponent } from '../../measurement/uncertainty';
import { quantityOf } from '../../quantity/quantity';
import type { NumberFact } from '../../rulebook/evaluate/facts';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import type { Length } from '../../tappet/bore-sheet';
import { diametersOf } from '../../tappet/clearance';
import { correctedReadings } from '../../tappet/dial';
import { type FootAgainstBody, footAgainstBody } from '../../tappet/foot';
import { type BoreMeasurement, measureBore } from '../../tappet/measure-bore';
import { placesOf } from '../../tappet/places';
import { DIAL, MICROMETER } from '../../tappet/sheet-budget';
import type { BoreSet } from './bore-sets';
import { diameterBudget, formBudget } from './measure-lifter';

export interface SetResult {
  readonly set: BoreSet;
  readonly measurement: BoreMeasurement;
  readonly foot: FootAgainstBody | null;
}

export const measureSet = (set: BoreSet): SetResult => ({
  set,
  measurement: measureBore(set.sheet),
  foot: footAgainstBody(set.foot, set.sheet.lifter, set.sheet.unit, set.sheet.lifterGauge),
});

/** A number before it has its place. */
export type Fact = Omit<NumberFact, 'position'>;

const uncertaintyFrom = (budget: readonly UncertaintyComponent[]) => ({
  ...combine(budget),
  budget,
});

const threeFigures = (
  quantity: QuantityName,
  unit: string,
  series: Series,
  uncertainty: ReturnType<typeof uncertaintyFrom>,
): readonly Fact[] =>
  series.length === 0
    ? []
    : [
        {
          quantity,
          figure: 'mean',
          value: quantityOf('length', mean(series), unit),
          ...uncertainty,
        },
        {
          quantity,
          figure: 'smallest',
          value: quantityOf('length', smallest(series), unit),
          ...uncertainty,
        },
        {
          quantity,
          figure: 'largest',
          value: quantityOf('length', largest(series), unit),
          ...uncertainty,
        },
      ];

const clearanceFacts = ({ measurement }: SetResult): readonly Fact[] => {
  const found = measurement.clearanceAt20C ?? measurement.clearance;
  if (found === null) return [];
  const fact = { quantity: 'tappet-clearance', ...uncertaintyFrom(measurement.budget) } as const;
  return [
    { ...fact, figure: 'mean', value: found.mean },
    { ...fact, figure: 'smallest', value: found.min },
    { ...fact, figure: 'largest', value: found.max },
  ];
};

const formFacts = ({ set, measurement }: SetResult): readonly Fact[] => {
  const uncertainty = uncertaintyFrom(formBudget(set.sheet.gauge ?? DIAL, measurement.budget));
  const { outOfRound, taper } = measurement;
  const fact = (quantity: QuantityName, value: Length): Fact => ({
    quantity,
    value,
    ...uncertainty,
  });
  return [
    ...(outOfRound === null ? [] : [fact('bore-out-of-round', outOfRound)]),
    ...(taper === null ? [] : [fact('bore-taper', taper.depthMeans)]),
  ];
};

const lifterFacts = ({ set, foot }: SetResult): readonly Fact[] => {
  const { lifter, lifterGauge = MICROMETER, unit } = set.sheet;
  const figures = (quantity: QuantityName, lengths: readonly Length[]) => {
    const [first] = lengths;
    return first === undefined
      ? []
      : threeFigures(
          quantity,
          unit,
          lengths.map((length) => length.value),
          uncertaintyFrom(diameterBudget(first, lifterGauge)),
        );
  };
  return [
    ...figures('lifter-body-diameter', lifter),
    ...figures('foot-diameter', set.foot),
    ...(foot === null
      ? []
      : [
          {
            quantity: 'foot-less-body',
            value: foot.difference,
            ...uncertaintyFrom(foot.components),
          } as const,
        ]),
  ];
};

const boreFacts = ({ set, measurement }: SetResult): readonly Fact[] => {
  const now = diametersOf(set.sheet, placesOf(correctedReadings(set.sheet)));
  if (now?.sizesKnown !== true) return [];
  const uncertainty = uncertaintyFrom(measurement.budget);
  return threeFigures('tappet-bore-diameter', set.sheet.unit, now.bores, uncertainty);
};

/** Every number that one set gives, each with its uncertainty. */
export const factsOfSet = (result: SetResult): readonly Fact[] => [
  ...lifterFacts(result),
  ...boreFacts(result),
  ...clearanceFacts(result),
  ...formFacts(result),
];
