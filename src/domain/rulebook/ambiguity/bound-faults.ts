import type { Fault } from '../../failure';
import { compare } from '../../quantity/rational';
import type { LimitRequirement } from '../limit';
import { getQuantityEntry } from '../quantity-catalogue';
import { isNegative, isZero, read, when } from './check';

/** The limit's own numbers: one way of stating them, with room between and a tolerance. */
export const boundFaults = (limit: LimitRequirement, pointer: string): readonly Fault[] => {
  const { dimension, label } = getQuantityEntry(limit.quantity);
  const number = (name: 'min' | 'max') => read(limit[name], dimension, `${pointer}/${name}`, label);
  const min = number('min');
  const max = number('max');
  const size = read(limit.nominal?.size, dimension, `${pointer}/nominal/size`, label);
  const plus = read(limit.nominal?.plus, dimension, `${pointer}/nominal/plus`, 'The tolerance');
  const minus = read(limit.nominal?.minus, dimension, `${pointer}/nominal/minus`, 'The tolerance');
  const some = limit.min !== undefined || limit.max !== undefined;
  return [
    ...[min, max, size, plus, minus].flatMap((entry) => entry.faults),
    ...when(
      !some && limit.nominal === undefined,
      pointer,
      'No limit is stated: give a least, a largest, or a nominal with its tolerance.',
    ),
    ...when(
      some && limit.nominal !== undefined,
      `${pointer}/nominal`,
      'State either a nominal with its tolerance or a least and a largest, not both.',
    ),
    ...when(
      min.value !== undefined && max.value !== undefined && compare(max.value, min.value) < 0,
      `${pointer}/max`,
      'The largest allowed is below the least allowed.',
    ),
    ...when(
      min.value !== undefined && max.value !== undefined && compare(max.value, min.value) === 0,
      `${pointer}/max`,
      'Least and largest are the same: no part measures exactly that. State a tolerance.',
    ),
    ...when(
      isZero(plus.value) && isZero(minus.value),
      `${pointer}/nominal`,
      'A bare nominal: sound parts measure a little off it. State how much over and under is allowed.',
    ),
    ...when(
      isNegative(plus.value),
      `${pointer}/nominal/plus`,
      'Write the tolerance without a sign.',
    ),
    ...when(
      isNegative(minus.value),
      `${pointer}/nominal/minus`,
      'Write the tolerance without a sign.',
    ),
  ];
};
