import type { Quantity } from '../quantity/quantity';
import { add, div, mul, negate, type Rational, rational, sub, zero } from '../quantity/rational';
import { inInches } from './circle';
import { asTyped, type Derived, derive, type Input, shown } from './derived';

export interface SpringPoint {
  readonly height: Input<'length'>;
  readonly load: Input<'force'>;
}

const rateUnit = ({ height, load }: SpringPoint): string =>
  inInches(height.value.unit) && load.value.unit === 'lbf' ? 'lbf/in' : 'N/mm';

type Values = Readonly<Record<string, Rational>>;

const inputsOf = (points: readonly SpringPoint[]): Record<string, Input> =>
  Object.fromEntries(
    points.flatMap(({ height, load }, i) => [
      [`height ${i + 1}`, height],
      [`load ${i + 1}`, load],
    ]),
  );

/** Least squares through the points; with two points simply the line through them. */
function line(
  values: Values,
  count: number,
): { readonly rate: Rational; readonly at: (h: Rational) => Rational } {
  const rows = Array.from({ length: count }, (_, i) => ({
    height: values[`height ${i + 1}`] ?? zero,
    load: values[`load ${i + 1}`] ?? zero,
  }));
  const n = rational(BigInt(count));
  const mean = (key: 'height' | 'load') => div(rows.map((row) => row[key]).reduce(add, zero), n);
  const [height, load] = [mean('height'), mean('load')];
  const sum = (of: (row: (typeof rows)[number]) => Rational) => rows.map(of).reduce(add, zero);
  const slope = div(
    sum((row) => mul(sub(row.height, height), sub(row.load, load))),
    sum((row) => mul(sub(row.height, height), sub(row.height, height))),
  );
  return { rate: negate(slope), at: (h) => add(load, mul(slope, sub(h, height))) };
}

/** True when the points stand at one height only: then they hold no rate. */
export const oneHeightOnly = (points: readonly SpringPoint[]): boolean =>
  points.every(({ height }) => {
    const first = points[0]?.height.value.value ?? zero;
    return sub(height.value.value, first).n === 0n;
  });

/** Load gained for each unit of height lost, from two points or more at different heights. */
export function springRate(points: readonly SpringPoint[]): Derived<'stiffness'> {
  const [first] = points;
  if (first === undefined || oneHeightOnly(points))
    throw new RangeError('a rate needs two heights');
  const result = derive({
    dimension: 'stiffness',
    unit: rateUnit(first),
    inputs: inputsOf(points),
    evaluate: (values: Values) => line(values, points.length).rate,
    datum: 'between the stated heights, damper and seat as installed',
    working: [],
  });
  const way =
    points.length === 2
      ? `Difference of loads over difference of heights, ${points.map(({ height, load }) => `${asTyped(load)} at ${asTyped(height)}`).join(' and ')}`
      : `Straight line through ${points.length} points by least squares`;
  return { ...result, working: [way, `= ${shown(result.value, 2)}`] };
}

/** Load at a height on the line through the measured points. */
export function springLoad(
  points: readonly SpringPoint[],
  height: Quantity<'length'>,
): Derived<'force'> {
  const [first] = points;
  if (first === undefined || oneHeightOnly(points))
    throw new RangeError('a load needs two heights');
  const result = derive({
    dimension: 'force',
    unit: first.load.value.unit,
    inputs: inputsOf(points),
    evaluate: (values: Values) => line(values, points.length).at(height.value),
    datum: `at ${asTyped({ value: height })} height`,
    working: [],
  });
  return {
    ...result,
    working: [`Load at ${asTyped({ value: height })} = ${shown(result.value, 2)}`],
  };
}
