import { div, mul, type Rational, rational, sub } from '../quantity/rational';
import { inInches } from './circle';
import { asTyped, type Derived, derive, type Input, shown } from './derived';

export interface SpringWire {
  readonly wire: Input<'length'>;
  /** Outside diameter of the coil. */
  readonly outside: Input<'length'>;
  readonly activeCoils: Input<'ratio'>;
  readonly shearModulus: Input<'pressure'>;
}

const power = (x: Rational, n: number): Rational => (n === 1 ? x : mul(x, power(x, n - 1)));

/** Rate of a round-wire coil spring: d⁴G / 8D³N, D the mean coil diameter (Shigley, chapter 10). */
export function rateOfWire({
  wire,
  outside,
  activeCoils,
  shearModulus,
}: SpringWire): Derived<'stiffness'> {
  const result = derive({
    dimension: 'stiffness',
    unit: inInches(wire.value.unit) ? 'lbf/in' : 'N/mm',
    inputs: { wire, outside, activeCoils, shearModulus },
    evaluate: (x) =>
      div(
        mul(power(x.wire, 4), x.shearModulus),
        mul(rational(8n), mul(power(sub(x.outside, x.wire), 3), x.activeCoils)),
      ),
    datum: 'round wire, constant coil diameter, small deflection',
    working: [],
  });
  const line = `(${asTyped(wire)})⁴ × ${asTyped(shearModulus)} ÷ (8 × (${asTyped(outside)} − ${asTyped(wire)})³ × ${activeCoils.value.text})`;
  return { ...result, working: [line, `= ${shown(result.value, 3)}`] };
}
