import type { Fault } from '../../failure';
import type { LimitRequirement, Measurand, ReferenceAverageRequirement } from '../limit';
import { getQuantityEntry, isQuantityName, type QuantityName } from '../quantity-catalogue';
import { boundFaults } from './bound-faults';
import { isNegative, isZero, read, when } from './check';
import { heldFaults, measurandFaults } from './measurand-faults';

/** Worked out from numbers of several places; no set of readings is theirs alone. */
const NO_SETS: readonly QuantityName[] = ['displacement', 'compression-ratio'];

const roundingFaults = (limit: LimitRequirement, pointer: string): readonly Fault[] => {
  const { dimension } = getQuantityEntry(limit.quantity);
  const step = read(limit.rounding?.step, dimension, `${pointer}/rounding/step`, 'The step');
  return [
    ...step.faults,
    ...when(
      isNegative(step.value) || isZero(step.value),
      `${pointer}/rounding/step`,
      'The step to round to is more than zero.',
    ),
    ...when(
      limit.rounding?.of === 'measured' && limit.comparison.method === 'rounded',
      `${pointer}/comparison`,
      'The measured value would be rounded twice: keep one of the two.',
    ),
  ];
};

const unknown = (requirement: Measurand, pointer: string): readonly Fault[] =>
  when(
    !isQuantityName(requirement.quantity),
    `${pointer}/quantity`,
    `"${requirement.quantity}" is no quantity of the catalogue.`,
  );

/** Everything that a limit leaves open, or that contradicts itself. */
export const limitFaults = (limit: LimitRequirement, pointer: string): readonly Fault[] => {
  const strange = unknown(limit, pointer);
  if (strange.length > 0) return strange;
  const count = limit.sample.kind === 'some' ? limit.sample.count : 1;
  return [
    ...measurandFaults(limit, pointer),
    ...boundFaults(limit, pointer),
    ...heldFaults(limit, pointer),
    ...roundingFaults(limit, pointer),
    ...when(
      !Number.isInteger(count) || count < 1,
      `${pointer}/sample/count`,
      'A sample is a whole number of one or more.',
    ),
    ...when(
      limit.twoSets === 'each' && NO_SETS.includes(limit.quantity),
      `${pointer}/twoSets`,
      `${getQuantityEntry(limit.quantity).label} is worked out from other numbers: sets are taken of those, not of it.`,
    ),
    ...when(
      limit.twoSets === 'each' && limit.per === 'car',
      `${pointer}/twoSets`,
      'A whole car is checked at the line, once: sets are taken of parts.',
    ),
  ];
};

export const referenceFaults = (
  requirement: ReferenceAverageRequirement,
  pointer: string,
): readonly Fault[] => {
  const strange = unknown(requirement, pointer);
  if (strange.length > 0) return strange;
  const { dimension } = getQuantityEntry(requirement.quantity);
  const plus = read(requirement.plus, dimension, `${pointer}/plus`, 'The tolerance');
  const minus = read(requirement.minus, dimension, `${pointer}/minus`, 'The tolerance');
  return [
    ...measurandFaults(requirement, pointer),
    ...heldFaults(requirement, pointer),
    ...plus.faults,
    ...minus.faults,
    ...when(
      isZero(plus.value) && isZero(minus.value),
      `${pointer}/plus`,
      'State how far from the reference parts’ mean a part may be.',
    ),
    ...when(isNegative(plus.value), `${pointer}/plus`, 'Write the tolerance without a sign.'),
    ...when(isNegative(minus.value), `${pointer}/minus`, 'Write the tolerance without a sign.'),
    ...when(
      !Number.isInteger(requirement.n) || requirement.n < 2,
      `${pointer}/n`,
      'An average takes at least two reference parts; three is common practice.',
    ),
  ];
};
