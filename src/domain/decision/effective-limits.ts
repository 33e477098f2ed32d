import { getUnit } from '../quantity/find-unit';
import type { Quantity } from '../quantity/quantity';
import {
  add,
  div,
  mul,
  powerOfTen,
  type Rational,
  rational,
  sub,
  zero,
} from '../quantity/rational';
import { down, up } from '../quantity/round';
import type { Comparison, Limits } from './requirement';
import type { End, Window } from './window';

/**
 * The limits as the comparison makes them. Absolute: as written. Rounded: the values that round, half
 * to even, to a permitted one; so a maximum of 40 to whole units holds up to 40.5 itself, and one of
 * 0.5 to tenths holds up to, but not including, 0.55 (ASTM E29, rounding method).
 */
export const effectiveLimits = (limits: Limits, comparison: Comparison): Window => ({
  low: limits.min && effective(limits.min, comparison, 'low'),
  high: limits.max && effective(limits.max, comparison, 'high'),
});

const effective = (limit: Quantity, comparison: Comparison, side: 'low' | 'high'): End => {
  if (comparison.method === 'absolute') return { at: limit.value, closed: true };
  const unit = getUnit(limit.dimension, limit.unit);
  const offset = unit.offset ?? zero;
  const step = mul(powerOfTen(-comparison.decimals), unit.factor);
  const steps = div(sub(limit.value, offset), step);
  const last = side === 'high' ? down(steps) : up(steps);
  const half: Rational = rational(side === 'high' ? 1n : -1n, 2n);
  return { at: add(mul(add(rational(last), half), step), offset), closed: last % 2n === 0n };
};
