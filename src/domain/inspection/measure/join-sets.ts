import { agrees } from '../../decision/agree';
import { mean } from '../../measurement/series';
import { quantityOf } from '../../quantity/quantity';
import type { NumberFact } from '../../rulebook/evaluate/facts';
import type { Fact } from './measure-position';

const DISAGREE = 'two independent sets of readings differ by more than their uncertainty';

/**
 * One fact a figure out of all sets: their mean, with the larger uncertainty (independent sets by one
 * gauge share its errors). Sets that disagree support no breach.
 */
export const joinSets = (
  position: string,
  sets: readonly (readonly Fact[])[],
): readonly NumberFact[] => {
  const groups = new Map<string, Fact[]>();
  for (const fact of sets.flat()) {
    const key = `${fact.quantity} ${fact.figure ?? ''}`;
    groups.set(key, [...(groups.get(key) ?? []), fact]);
  }
  return [...groups.values()].flatMap(([first, ...others]): readonly NumberFact[] => {
    if (first === undefined) return [];
    if (others.length === 0) return [{ ...first, position }];
    const widest = others.reduce(
      (wide, fact) => (fact.standardUncertainty > wide.standardUncertainty ? fact : wide),
      first,
    );
    const { dimension, unit } = first.value;
    const joined = mean([first, ...others].map((fact) => fact.value.value));
    return [
      {
        ...widest,
        position,
        value: quantityOf(dimension, joined, unit),
        ...(others.every((fact) => agrees(first, fact)) ? {} : { cannotSupportBreach: DISAGREE }),
      },
    ];
  });
};
