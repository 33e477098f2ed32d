import type { Dimension } from '../../quantity/dimension';
import { minus, type Quantity } from '../../quantity/quantity';
import { abs, compare } from '../../quantity/rational';

/** One line of a cam card, declared and found at the same datum. */
export interface CamCardLine<D extends Exclude<Dimension, 'temperature'> = 'angle' | 'length'> {
  readonly name: string;
  readonly declared: Quantity<D>;
  /** Absent: not measured. */
  readonly found?: Quantity<D> | undefined;
  /** The largest difference that the rule lets pass, either way; absent: none is stated. */
  readonly tolerance?: Quantity<D> | undefined;
}

export interface CamCardDifference {
  readonly name: string;
  /** Found less declared; null when not measured. */
  readonly difference: Quantity | null;
  /** null when not measured or no tolerance is stated. Equal to the tolerance agrees. */
  readonly agrees: boolean | null;
}

/** What was found against what was declared, line by line, exactly. Mixed dimensions throw. */
export const compareWithCamCard = (lines: readonly CamCardLine[]): readonly CamCardDifference[] =>
  lines.map(({ name, declared, found, tolerance }) => {
    if (found === undefined) return { name, difference: null, agrees: null };
    const difference = minus<'angle' | 'length'>(found, declared);
    if (tolerance !== undefined && tolerance.dimension !== difference.dimension)
      throw new TypeError(`a tolerance of ${name} is ${tolerance.dimension}`);
    return {
      name,
      difference,
      agrees: tolerance === undefined ? null : compare(abs(difference.value), tolerance.value) <= 0,
    };
  });
