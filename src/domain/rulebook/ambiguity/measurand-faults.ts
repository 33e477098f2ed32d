import { decisionRuleFault } from '../../decision/decision-rule';
import type { Fault } from '../../failure';
import type { HeldAgainst, Measurand } from '../limit';
import { getQuantityEntry } from '../quantity-catalogue';
import { at, isBlank, isNegative, isZero, read, unitFaults, when } from './check';

/** What is measured and where: unit, part, figure, datum, lash and checking lifter. */
export const measurandFaults = (measurand: Measurand, pointer: string): readonly Fault[] => {
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

/** How a value is held against its limit: rule, rounding, and what makes a gauge fit. */
export const heldFaults = (held: HeldAgainst & Measurand, pointer: string): readonly Fault[] => {
  const entry = getQuantityEntry(held.quantity);
  const rule = decisionRuleFault(held.decisionRule);
  const largest = read(
    held.maximumUncertainty,
    entry.dimension,
    `${pointer}/maximumUncertainty`,
    'The largest allowed uncertainty',
  );
  const ring = read(held.ringCheck, 'length', `${pointer}/ringCheck`, 'The check on the ring');
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
    ...ring.faults,
    ...when(
      isNegative(ring.value) || isZero(ring.value),
      `${pointer}/ringCheck`,
      'What the gauge may be off on the ring is more than zero; leave it empty where nothing makes up for a calibration.',
    ),
  ];
};
