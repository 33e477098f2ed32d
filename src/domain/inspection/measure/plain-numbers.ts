import { calibrationOf, resolutionOf } from '../../measurement/gauge-figures';
import { largest, mean, smallest } from '../../measurement/series';
import { combine, type UncertaintyComponent } from '../../measurement/uncertainty';
import { quantityOf } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';
import type { NumberFact } from '../../rulebook/evaluate/facts';
import type { RuleDimension } from '../../rulebook/quantities/entry';
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

/** What a gauge alone brings into a number read off it. */
export const gaugeBudget = (
  gauges: readonly GaugeRecord[],
  gaugeId: string,
  dimension: RuleDimension,
): readonly UncertaintyComponent[] => {
  const record = gauges.find((gauge) => gauge.id === gaugeId);
  if (record === undefined) return [];
  const gauge = gaugeOf(record, dimension);
  return [
    resolutionOf(gauge, 'the gauge’s division'),
    calibrationOf(gauge, 'the gauge’s calibration'),
  ];
};

const figuresOf = (
  readings: readonly JudgedReading[],
  gauges: readonly GaugeRecord[],
): readonly NumberFact[] => {
  const [first] = readings;
  if (first === undefined) return [];
  const { quantity, gaugeId } = first.row;
  const { dimension, per, unit } = getQuantityEntry(quantity);
  const series = readings.map(({ row }) => fromStored(row.value, dimension).value);
  const budget = gaugeBudget(gauges, gaugeId, dimension);
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
};

/** Quantities read off a gauge as they are: weights, lifts, cylinder bores and such. */
export const plainNumbers = (
  counting: readonly JudgedReading[],
  gauges: readonly GaugeRecord[],
): readonly NumberFact[] => {
  const groups = new Map<string, JudgedReading[]>();
  for (const reading of counting) {
    const { quantity } = reading.row;
    if (BY_SHEET.includes(quantity) || reading.row.referencePart !== undefined) continue;
    const key = `${quantity} ${positionKey(reading.place, getQuantityEntry(quantity).per)}`;
    groups.set(key, [...(groups.get(key) ?? []), reading]);
  }
  return [...groups.values()].flatMap((readings): readonly NumberFact[] => {
    const pooled = figuresOf(readings, gauges);
    const sets = [...new Set(readings.map(({ row }) => row.set))].sort((a, b) => a - b);
    if (sets.length < 2) return pooled;
    const own = sets.map((set) => ({
      set,
      numbers: figuresOf(
        readings.filter(({ row }) => row.set === set),
        gauges,
      ),
    }));
    return pooled.map((number) => ({
      ...number,
      sets: own.flatMap(({ set, numbers }) =>
        numbers.filter(({ figure }) => figure === number.figure).map((one) => ({ set, ...one })),
      ),
    }));
  });
};
