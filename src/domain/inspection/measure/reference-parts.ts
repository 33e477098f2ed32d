import { mean } from '../../measurement/series';
import { combine } from '../../measurement/uncertainty';
import { quantityOf } from '../../quantity/quantity';
import { fromStored } from '../../quantity/stored';
import type { ReferenceFact } from '../../rulebook/evaluate/facts';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import type { GaugeRecord } from '../capture/gauge-record';
import type { JudgedReading } from '../capture/readings-that-count';
import { gaugeBudget } from './plain-numbers';

/** Every reference part that was measured: the mean of its readings, by the gauge's own uncertainty. */
export const referencesFrom = (
  counting: readonly JudgedReading[],
  gauges: readonly GaugeRecord[],
): readonly ReferenceFact[] => {
  const groups = new Map<string, JudgedReading[]>();
  for (const reading of counting) {
    const { quantity, referencePart } = reading.row;
    if (referencePart === undefined) continue;
    const key = `${quantity} ${referencePart}`;
    groups.set(key, [...(groups.get(key) ?? []), reading]);
  }
  return [...groups.values()].flatMap((readings): readonly ReferenceFact[] => {
    const [first] = readings;
    if (first?.row.referencePart === undefined) return [];
    const { quantity, referencePart, gaugeId } = first.row;
    const { dimension, unit } = getQuantityEntry(quantity);
    const series = readings.map(({ row }) => fromStored(row.value, dimension).value);
    const { standardUncertainty } = combine(gaugeBudget(gauges, gaugeId, dimension));
    const value = quantityOf(dimension, mean(series), unit);
    return [{ quantity, part: referencePart, value, standardUncertainty }];
  });
};
