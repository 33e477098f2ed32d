import type { Dimension } from '../quantity/dimension';
import { add, div, type Rational } from '../quantity/rational';
import { asTyped, type Derived, derive, type Input, shown } from './derived';

export interface CornerWeights {
  readonly leftFront: Input<'mass'>;
  readonly rightFront: Input<'mass'>;
  readonly leftRear: Input<'mass'>;
  readonly rightRear: Input<'mass'>;
}

export interface WeightDistribution {
  readonly total: Derived<'mass'>;
  readonly left: Derived<'ratio'>;
  readonly rear: Derived<'ratio'>;
  /** Right front and left rear together. */
  readonly cross: Derived<'ratio'>;
}

type Corner = keyof CornerWeights;
type Sizes = { readonly [Name in Corner]: Rational };

const DATUM =
  'all four wheels on level pads at once, as the rule says with or without driver and fuel';
const NAMES: Readonly<Record<Corner, string>> = {
  leftFront: 'left front',
  rightFront: 'right front',
  leftRear: 'left rear',
  rightRear: 'right rear',
};

const totalOf = (x: Sizes): Rational =>
  [x.rightFront, x.leftRear, x.rightRear].reduce(add, x.leftFront);

/** Total and shares in per cent of the total, which must be above zero. */
export function weightDistribution(corners: CornerWeights): WeightDistribution {
  const inputs = { ...corners };
  const formula = <D extends Dimension>(
    dimension: D,
    unit: string,
    evaluate: (x: Sizes) => Rational,
  ) => derive({ dimension, unit, inputs, evaluate, datum: DATUM, working: [] });
  const total = formula('mass', corners.leftFront.value.unit, totalOf);
  if (total.value.value.n <= 0n) throw new RangeError('the car weighs nothing');
  const all = `${shown(total.value, 1)}`;
  const share = (first: Corner, second: Corner): Derived<'ratio'> => {
    const result = formula('ratio', '%', (x) => div(add(x[first], x[second]), totalOf(x)));
    const line = `(${NAMES[first]} ${asTyped(corners[first])} + ${NAMES[second]} ${asTyped(corners[second])}) ÷ ${all} = ${shown(result.value, 3)}`;
    return { ...result, working: [line] };
  };
  const sum = (Object.keys(NAMES) as Corner[]).map((name) => asTyped(corners[name])).join(' + ');
  return {
    total: { ...total, working: [`Total: ${sum} = ${all}`] },
    left: share('leftFront', 'leftRear'),
    rear: share('leftRear', 'rightRear'),
    cross: share('rightFront', 'leftRear'),
  };
}
