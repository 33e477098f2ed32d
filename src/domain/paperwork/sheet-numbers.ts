import { largest, mean, type Series, smallest } from '../measurement/series';
import type { Quantity } from '../quantity/quantity';
import { quantityOf } from '../quantity/quantity';
import { fromStored } from '../quantity/stored';
import type { NumberFact } from '../rulebook/evaluate/facts';
import type { RuleDimension } from '../rulebook/quantities/entry';
import { getQuantityEntry, type QuantityName } from '../rulebook/quantity-catalogue';
import { clearanceOf } from '../tappet/clearance';
import { footAgainstBody } from '../tappet/foot';
import type { DeclaredReading } from './document';

type Fact = Pick<NumberFact, 'figure' | 'value'>;
type Length = Quantity<'length'>;

const figuresOf = <D extends RuleDimension>(
  dimension: D,
  unit: string,
  figures: Readonly<Record<'mean' | 'min' | 'max', Quantity['value']>>,
): readonly Fact[] => [
  { figure: 'mean', value: quantityOf(dimension, figures.mean, unit) },
  { figure: 'smallest', value: quantityOf(dimension, figures.min, unit) },
  { figure: 'largest', value: quantityOf(dimension, figures.max, unit) },
];

/** One reading serves as any figure, and as it was written; several give all three. */
const plain = (values: readonly Quantity<RuleDimension>[]): readonly Fact[] => {
  const [first] = values;
  if (first === undefined) return [];
  if (values.length === 1) return [{ value: first }];
  const series: Series = values.map(({ value }) => value);
  return figuresOf(first.dimension, first.unit, {
    mean: mean(series),
    min: smallest(series),
    max: largest(series),
  });
};

const clearance = (bores: readonly Length[], lifters: readonly Length[]): readonly Fact[] => {
  const [first] = bores;
  if (first === undefined || lifters.length === 0) return [];
  const found = clearanceOf(
    bores.map(({ value }) => value),
    lifters.map(({ value }) => value),
  );
  return bores.length === 1 && lifters.length === 1
    ? [{ value: quantityOf('length', found.mean, first.unit) }]
    : figuresOf('length', first.unit, found);
};

/** Every number that a declared sheet gives: as written, and worked out where two readings make one. */
export const numbersFrom = (readings: readonly DeclaredReading[]): readonly NumberFact[] => {
  const positions = [...new Set(readings.map((reading) => reading.position))];
  return positions.flatMap((position) => {
    const here = readings.filter((reading) => reading.position === position);
    const of = (quantity: QuantityName) =>
      here
        .filter((reading) => reading.quantity === quantity)
        .map((reading) => fromStored(reading.value, getQuantityEntry(quantity).dimension));
    const lengths = (quantity: QuantityName) =>
      here
        .filter((reading) => reading.quantity === quantity)
        .map((reading) => fromStored(reading.value, 'length'));
    const body = lengths('lifter-body-diameter');
    const foot = footAgainstBody(
      lengths('foot-diameter'),
      body,
      lengths('foot-diameter')[0]?.unit ?? 'in',
    );
    const facts = (quantity: QuantityName, found: readonly Fact[]): readonly NumberFact[] =>
      found.map((fact) => ({ quantity, position, standardUncertainty: 0, ...fact }));
    return [
      ...[...new Set(here.map((reading) => reading.quantity))].flatMap((quantity) =>
        facts(quantity, plain(of(quantity))),
      ),
      ...facts('tappet-clearance', clearance(lengths('tappet-bore-diameter'), body)),
      ...facts('foot-less-body', foot === null ? [] : [{ value: foot.difference }]),
    ];
  });
};
