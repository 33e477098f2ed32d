import type { Dimension } from './dimension';
import { div, fromDecimalText, mul, type Rational, rational } from './rational';

/** value in the base = value in this unit × factor + offset; the offset is absent but for temperatures. */
export interface Unit<D extends Dimension = Dimension> {
  readonly dimension: D;
  readonly symbol: string;
  readonly names: readonly string[];
  readonly factor: Rational;
  readonly offset?: Rational;
}

const INCH = fromDecimalText('0.0254');
const POUND = fromDecimalText('0.45359237');
const POUND_FORCE = fromDecimalText('4.4482216152605');
const CELSIUS_ZERO = fromDecimalText('273.15');
const FAHRENHEIT = rational(5n, 9n);
const exact = fromDecimalText;
const inches = (text: string): Rational => mul(exact(text), INCH);
const inchesTo = (power: 2 | 3): Rational =>
  power === 2 ? mul(INCH, INCH) : mul(INCH, mul(INCH, INCH));

const unit = <D extends Dimension>(
  dimension: D,
  symbol: string,
  factor: Rational,
  names: readonly string[] = [],
  offset?: Rational,
): Unit<D> => ({
  dimension,
  symbol,
  names,
  factor,
  ...(offset === undefined ? {} : { offset }),
});

/**
 * Every unit with its exact factor to the base of its dimension: m, m², m³, kg, N, degree (a radian
 * is no exact number of degrees), Pa, K, N/m, 1. Source: international yard and pound agreement 1959;
 * NIST SP 811 appendix B; the pound-force from standard gravity 9.80665 m/s².
 * "Thou" and "tenths" are the trade's: 0.001 in and 0.0001 in.
 */
export const UNITS: readonly Unit[] = [
  unit('length', 'in', INCH, ['inch', 'inches', '"', '″', '”']),
  unit('length', 'thou', inches('0.001'), ['thousandths', 'thousandth', 'mil', 'mils']),
  unit('length', 'tenths', inches('0.0001'), ['tenth']),
  unit('length', 'µin', inches('0.000001'), ['μin', 'uin', 'microinch', 'microinches']),
  unit('length', 'ft', inches('12'), ['foot', 'feet']),
  unit('length', 'mm', exact('0.001'), ['millimetre', 'millimetres', 'millimeter', 'millimeters']),
  unit('length', 'µm', exact('0.000001'), ['μm', 'um', 'micron', 'microns']),
  unit('length', 'cm', exact('0.01'), ['centimetre', 'centimeter']),
  unit('length', 'm', exact('1'), ['metre', 'meter', 'metres', 'meters']),
  unit('area', 'in²', inchesTo(2), ['in2', 'in^2', 'sq in']),
  unit('area', 'mm²', exact('0.000001'), ['mm2', 'mm^2']),
  unit('area', 'cm²', exact('0.0001'), ['cm2', 'cm^2']),
  unit('area', 'm²', exact('1'), ['m2', 'm^2']),
  unit('volume', 'in³', inchesTo(3), ['in3', 'in^3', 'cu in', 'cid', 'ci']),
  unit('volume', 'cc', exact('0.000001'), ['cm³', 'cm3', 'cm^3', 'ml', 'ccs']),
  unit('volume', 'l', exact('0.001'), ['litre', 'liter', 'litres', 'liters', 'dm³', 'dm3']),
  unit('volume', 'm³', exact('1'), ['m3', 'm^3']),
  unit('mass', 'lb', POUND, ['lbs', 'pound', 'pounds', 'lbm']),
  unit('mass', 'oz', div(POUND, exact('16')), ['ounce', 'ounces']),
  unit('mass', 'kg', exact('1'), ['kgs', 'kilogram', 'kilograms']),
  unit('mass', 'g', exact('0.001'), ['gram', 'grams']),
  unit('force', 'lbf', POUND_FORCE, ['lb', 'lbs', 'pound', 'pounds']),
  unit('force', 'N', exact('1'), ['newton', 'newtons']),
  unit('force', 'kN', exact('1000')),
  unit('force', 'kgf', exact('9.80665')),
  unit('angle', 'deg', exact('1'), ['°', 'degree', 'degrees', 'º']),
  unit('angle', 'arcmin', rational(1n, 60n), ["'", '′', '’', 'min', 'minute', 'minutes']),
  unit('pressure', 'psi', div(POUND_FORCE, inchesTo(2)), ['lbf/in²', 'lbf/in2']),
  unit('pressure', 'kPa', exact('1000')),
  unit('pressure', 'bar', exact('100000')),
  unit('pressure', 'MPa', exact('1000000')),
  unit('pressure', 'Pa', exact('1')),
  unit('temperature', '°C', exact('1'), ['c', 'ºc', 'degc', 'deg c', 'celsius'], CELSIUS_ZERO),
  unit(
    'temperature',
    '°F',
    FAHRENHEIT,
    ['f', 'ºf', 'degf', 'deg f', 'fahrenheit'],
    mul(exact('459.67'), FAHRENHEIT),
  ),
  unit('temperature', 'K', exact('1'), ['kelvin']),
  unit('temperature-difference', 'K', exact('1'), ['°c', 'c', 'kelvin', 'deg c']),
  unit('temperature-difference', '°F', FAHRENHEIT, ['f', 'deg f']),
  unit('stiffness', 'lbf/in', div(POUND_FORCE, INCH), ['lb/in', 'lbs/in']),
  unit('stiffness', 'N/mm', exact('1000')),
  unit('stiffness', 'N/m', exact('1')),
  unit('ratio', '1', exact('1'), [':1']),
  unit('ratio', '%', exact('0.01'), ['percent', 'per cent']),
  unit('count', 'pcs', exact('1'), ['1', 'pieces', 'pc']),
];
