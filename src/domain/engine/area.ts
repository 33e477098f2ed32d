import { add, type Rational, zero } from '../quantity/rational';
import { areaUnit, circleArea } from './circle';
import { asTyped, type Derived, derive, type Input, shown } from './derived';

/** Area of one round hole or of several together, in in² or mm² as the first diameter is written. */
export function roundArea(diameters: readonly Input<'length'>[]): Derived<'area'> {
  const [first] = diameters;
  if (first === undefined) throw new RangeError('an area needs a diameter');
  const names = diameters.map((_, i) =>
    diameters.length === 1 ? 'diameter' : `diameter ${i + 1}`,
  );
  const result = derive({
    dimension: 'area',
    unit: areaUnit(first.value.unit),
    inputs: Object.fromEntries(diameters.map((diameter, i) => [names[i] ?? '', diameter])),
    evaluate: (values: Readonly<Record<string, Rational>>) =>
      names.reduce((sum, name) => add(sum, circleArea(values[name] ?? zero)), zero),
    datum: 'the smallest diameter of each hole: π/4 × diameter², summed over the holes',
    working: [],
  });
  const sum = diameters.map((diameter) => `π/4 × (${asTyped(diameter)})²`).join(' + ');
  return { ...result, working: [`${sum} = ${shown(result.value, 5)}`] };
}
