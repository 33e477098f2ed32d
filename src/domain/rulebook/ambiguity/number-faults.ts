import { decisionRuleFault } from '../../decision/decision-rule';
import type { Fault } from '../../failure';
import { compare } from '../../quantity/rational';
import type {
  HeldAgainst,
  LimitRequirement,
  Measurand,
  ReferenceAverageRequirement,
} from '../limit';
import { getQuantityEntry, isQuantityName } from '../quantity-catalogue';
import { at, isBlank, isNegative, isZero, read, unitFaults, when } from './check';

const measurandFaults = (measurand: Measurand, pointer: string): readonly Fault[] => {
  const entry = getQuantityEntry(measurand.quantity);
  const lash = entry.needsLash === true;
  return [
    ...unitFaults(measurand.unit, entry.dimension, `${pointer}/unit`, entry.label),
    ...when(
      measurand.per !== entry.per,
      `${pointer}/per`,
      `${entry.label} is found per ${entry.per}, not per ${measurand.per}.`,
    ),
    ...when(
      entry.needsFigure === true && measurand.figure === undefined,
      `${pointer}/figure`,
      `There are several readings at each ${entry.per}: say whether their mean, the smallest or the largest counts.`,
    ),
    ...when(
      entry.needsDatum === true && isBlank(measurand.datum),
      `${pointer}/datum`,
      `${entry.label} needs its datum: say where, and at what, it is measured.`,
    ),
    ...when(
      lash && measurand.lash === undefined,
      `${pointer}/lash`,
      `${entry.label} depends on the lash: state it, 0 included.`,
    ),
    ...when(
      lash && measurand.checkingLifter === undefined,
      `${pointer}/checkingLifter`,
      `Say whether a solid checking lifter stands in or the lifters stay as fitted: a hydraulic lifter gives way.`,
    ),
    ...read(measurand.lash, 'length', `${pointer}/lash`, 'Lash').faults,
  ];
};

const DECIMAL = /^\d*\.?\d+$/;

const heldFaults = (held: HeldAgainst & Measurand, pointer: string): readonly Fault[] => {
  const entry = getQuantityEntry(held.quantity);
  const rule = decisionRuleFault(held.decisionRule);
  const largest = read(
    held.maximumUncertainty,
    entry.dimension,
    `${pointer}/maximumUncertainty`,
    'The largest allowed uncertainty',
  );
  const decimals = held.comparison.method === 'rounded' ? held.comparison.decimals : 0;
  return [
    ...(rule === undefined ? [] : [at(`${pointer}/decisionRule`, rule)]),
    ...when(
      !Number.isInteger(decimals) || Math.abs(decimals) > 9,
      `${pointer}/comparison/decimals`,
      'Round to a whole number of decimals between −9 and 9.',
    ),
    ...when(
      held.fitRatio !== undefined && (!DECIMAL.test(held.fitRatio) || Number(held.fitRatio) <= 0),
      `${pointer}/fitRatio`,
      'The fitness number is a decimal number above zero, such as 2 or 4.',
    ),
    ...largest.faults,
    ...when(
      isNegative(largest.value) || isZero(largest.value),
      `${pointer}/maximumUncertainty`,
      'The largest allowed uncertainty is more than zero.',
    ),
  ];
};

const boundFaults = (limit: LimitRequirement, pointer: string): readonly Fault[] => {
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
