import { temperatureComponents } from '../../measurement/temperature';
import { rectangular, type UncertaintyComponent } from '../../measurement/uncertainty';
import { toNumber } from '../../quantity/rational';
import type { BoreSheet } from '../bore-sheet';
import type { Diameters } from '../clearance';
import { line } from './line';
import { boreMaterial, warmthsOf } from './warmths';

/** Half-width in kelvin of an unlogged difference between block and lifter left to settle. Common practice. */
const UNLOGGED = 2;
/** A lifter of 0.875 in, where no size is written: it only scales the temperature lines. */
const USUAL_SIZE = 0.875 * 0.0254;

/** The temperature's lines of the budget: of the correction where temperatures were logged, else an allowance. */
export const temperatureBudget = (
  sheet: BoreSheet,
  now: Diameters | null,
): readonly UncertaintyComponent[] => {
  const [lifter] = now?.sizesKnown === true ? now.lifters : [];
  const size = lifter === undefined ? USUAL_SIZE : toNumber(lifter);
  const warmths = warmthsOf(sheet);
  if (warmths !== null)
    return [
      ...temperatureComponents(size, warmths.bore, 'the block'),
      ...temperatureComponents(-size, warmths.lifter, 'the lifter'),
      ...(warmths.setting === undefined || sheet.zeroSize === undefined
        ? []
        : temperatureComponents(-size, warmths.setting, 'the setting ring')),
    ];
  const sensitivity = size * toNumber(boreMaterial(sheet).coefficient);
  return [
    line('temperature: not logged', rectangular(UNLOGGED), 'a temperature nobody logged', {
      sensitivity,
    }),
  ];
};
