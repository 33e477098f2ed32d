import { displacement } from '../../engine/displacement';
import { calibrationOf, resolutionOf } from '../../measurement/gauge-figures';
import { largest, mean, smallest } from '../../measurement/series';
import { combine } from '../../measurement/uncertainty';
import { findAs, quantityOf } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';
import { findNumber, type NumberFact, type Positions } from '../../rulebook/evaluate/facts';
import { getQuantityEntry, type QuantityName } from '../../rulebook/quantity-catalogue';
import { type GaugeRecord, gaugeOf } from '../capture/gauge-record';
import type { JudgedReading } from '../capture/readings-that-count';
import { positionKey } from '../capture/rows';

/** Read per bore and worked out together with the lifter, not here. */
const BY_SHEET: readonly QuantityName[] = [
  'lifter-body-diameter',
  'foot-diameter',
  'tappet-bore-diameter',
];

/** Quantities read off a gauge as they are: weights, lifts, cylinder bores and such. */
export const plainNumbers = (
  counting: readonly JudgedReading[],
  gauges: readonly GaugeRecord[],
): readonly NumberFact[] => {
  const groups = new Map<string, JudgedReading[]>();
  for (const reading of counting) {
    const { quantity } = reading.row;
    if (BY_SHEET.includes(quantity)) continue;
    const key = `${quantity} ${positionKey(reading.place, getQuantityEntry(quantity).per)}`;
    groups.set(key, [...(groups.get(key) ?? []), reading]);
  }
  return [...groups.values()].flatMap((readings): readonly NumberFact[] => {
    const [first] = readings;
    if (first === undefined) return [];
    const { quantity, gaugeId } = first.row;
    const { dimension, per, unit } = getQuantityEntry(quantity);
    const series = readings.map(({ row }) => fromStored(row.value, dimension).value);
    const record = gauges.find((gauge) => gauge.id === gaugeId);
    const gauge = record && gaugeOf(record, dimension);
    const budget =
      gauge === undefined
        ? []
        : [
            resolutionOf(gauge, 'the gauge’s division'),
            calibrationOf(gauge, 'the gauge’s calibration'),
          ];
    const fact = {
      quantity,
      position: positionKey(first.place, per),
      ...combine(budget),
      budget,
    };
    return [
      { ...fact, figure: 'mean', value: quantityOf(dimension, mean(series), unit) },
      { ...fact, figure: 'smallest', value: quantityOf(dimension, smallest(series), unit) },
      { ...fact, figure: 'largest', value: quantityOf(dimension, largest(series), unit) },
    ];
  });
};

/** Displacement from bores and stroke, where every cylinder and the stroke were measured and it was not itself. */
export const derivedNumbers = (
  numbers: readonly NumberFact[],
  positions: Positions,
): readonly NumberFact[] => {
  const facts = { numbers } as const;
  const find = (quantity: QuantityName, position: string) => {
    const fact = findNumber(facts, quantity, position, 'mean');
    const value = fact && findAs('length', fact.value);
    return fact && value && { value, standardUncertainty: fact.standardUncertainty };
  };
  if (findNumber(facts, 'displacement', 'engine', 'mean') !== undefined) return [];
  const stroke = find('stroke', 'engine');
  const bores = positions.cylinders.flatMap(({ key }) => find('cylinder-bore', key) ?? []);
  const cylinders = positions.cylinders.length;
  if (stroke === undefined || cylinders === 0 || bores.length < cylinders) return [];
  const {
    value,
    standardUncertainty = 0,
    contributions,
  } = displacement({ bores, stroke, cylinders });
  const budget = contributions.map(({ name, uncertainty }) => ({
    name,
    words: `how well the ${name} was measured`,
    standardUncertainty: uncertainty,
    sensitivity: 1,
    degreesOfFreedom: null,
  }));
  return [{ quantity: 'displacement', position: 'engine', value, standardUncertainty, budget }];
};
