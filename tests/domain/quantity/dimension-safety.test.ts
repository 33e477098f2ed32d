import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import type { LimitRequirement } from '@/domain/decision/requirement';
import { compareQuantities, findAs, minus, plus, type Quantity } from '@/domain/quantity/quantity';
import { inches, typed } from './build';

const size = inches('0.8440');
const weight = typed('mass', '5 lb');
const warm = typed('temperature', '60 °C');

const mixes: readonly (() => unknown)[] = [
  // @ts-expect-error a weight is not added to a length
  () => plus(size, weight),
  // @ts-expect-error a length is not taken from a weight
  () => minus(weight, size),
  // @ts-expect-error a length is not compared with a weight
  () => compareQuantities(size, weight),
  () => {
    const requirement: LimitRequirement<'length'> = {
      limits: { max: size },
      decisionRule: { kind: 'simple' },
      comparison: { method: 'absolute' },
    };
    // @ts-expect-error a weight is not held against a limit of length
    return assess(requirement, { value: weight, standardUncertainty: 0 });
  },
];

describe('dimensions do not mix', () => {
  it.each(mixes)('refused at run time too (%#)', (mix) => {
    expect(mix).toThrow(TypeError);
  });

  it('does not compile either: the lines above expect errors', () => {
    // @ts-expect-error a quantity of length is no quantity of mass
    const wrong: Quantity<'mass'> = size;
    // @ts-expect-error temperatures are not added
    const sum = () => plus(warm, warm);
    expect(wrong.dimension).toBe('length');
    expect(sum).toBeTypeOf('function');
  });

  it('narrows what is known at run time only', () => {
    expect(findAs('length', size)).toBe(size);
    expect(findAs('mass', size)).toBeUndefined();
  });
});
