import {
  abs,
  add,
  compare,
  div,
  fromDecimalText,
  max,
  min,
  type Rational,
  rational,
  sub,
} from '../quantity/rational';

/** Linear thermal expansion near 20 °C, per kelvin: the coefficient and the half-width around it. */
export interface Material {
  readonly name: string;
  readonly coefficient: Rational;
  /** Rectangular. */
  readonly halfWidth: Rational;
}

const material = (name: string, coefficient: string, halfWidth: string): Material => ({
  name,
  coefficient: fromDecimalText(coefficient),
  halfWidth: fromDecimalText(halfWidth),
});

/**
 * Coefficients: Callister, Fundamentals of Materials Science and Engineering, 3rd ed., table B.6 (grey
 * iron 11.4, ductile 11.2, steel 1040 11.3 and 4140 12.3, aluminium 356 21.5, all e-6 per K); steel also
 * JCGM 100:2008 H.1.2 (11.5e-6). Half-widths are common practice but for iron, whose 0.6e-6 reaches the
 * 10.8e-6 of another published table. Bronze (bearing bronze) is from memory, hence its wide half-width.
 */
export const MATERIALS: readonly Material[] = [
  material('iron', '11.4e-6', '0.6e-6'),
  material('ductile', '11.2e-6', '0.6e-6'),
  material('steel', '11.5e-6', '0.8e-6'),
  material('aluminium', '21.5e-6', '1.0e-6'),
  material('bronze', '18.0e-6', '1.0e-6'),
];

const ALIASES: Readonly<Record<string, string>> = {
  'cast iron': 'iron',
  'grey iron': 'iron',
  'gray iron': 'iron',
  'ductile iron': 'ductile',
  aluminum: 'aluminium',
};

const COEFFICIENT = /^\d*\.?\d+(?:e-?\d{1,2})?$/i;
const LARGEST = rational(1n, 1000n);

/**
 * By name, or by a coefficient per kelvin (`11.4e-6`); the latter with a half-width of 5 % of itself
 * (common practice). `undefined` when it is neither.
 */
export const findMaterial = (nameOrCoefficient: string): Material | undefined => {
  const name = nameOrCoefficient.trim().toLowerCase();
  const known = MATERIALS.find((one) => one.name === (ALIASES[name] ?? name));
  if (known !== undefined || !COEFFICIENT.test(name)) return known;
  const coefficient = fromDecimalText(name);
  if (compare(coefficient, LARGEST) > 0) return undefined;
  return { name, coefficient, halfWidth: div(coefficient, rational(20n)) };
};

/** As `findMaterial`, for names in code; an unknown one throws a RangeError. */
export const getMaterial = (name: string): Material => {
  const found = findMaterial(name);
  if (found === undefined) throw new RangeError(`No material "${name}".`);
  return found;
};

/**
 * A bore in a bushing pressed into a block follows neither alone: the coefficient is halfway between
 * theirs, and the half-width reaches the outer ends of both.
 */
export const bushed = (block: Material, bushing: Material): Material => {
  const low = min(
    sub(block.coefficient, block.halfWidth),
    sub(bushing.coefficient, bushing.halfWidth),
  );
  const high = max(
    add(block.coefficient, block.halfWidth),
    add(bushing.coefficient, bushing.halfWidth),
  );
  return {
    name: `${bushing.name} bushing in ${block.name}`,
    coefficient: div(add(low, high), rational(2n)),
    halfWidth: div(abs(sub(high, low)), rational(2n)),
  };
};
