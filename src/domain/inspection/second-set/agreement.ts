import { agrees, jointUncertainty } from '../../decision/agree';
import { widthIn } from '../../quantity/convert';
import type { Written } from '../../quantity/dimension';
import { asciiIn, formatWidth } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import { minus } from '../../quantity/quantity';
import { type QuantityName, readingsFor } from '../../rulebook/quantity-catalogue';
import type { Fact } from '../measure/measure-position';

/** One figure as two sets gave it, and whether they agree within their joint uncertainty. */
export interface Agreement {
  readonly quantity: QuantityName;
  readonly first: Written;
  readonly second: Written;
  /** Second less first. */
  readonly difference: Written;
  /** Of the difference of two independent values: 2 × √(u₁² + u₂²) (JCGM 100:2008, 5.1.2). */
  readonly expandedUncertainty: Written;
  readonly agree: boolean;
}

const SMALL: readonly QuantityName[] = [
  'tappet-clearance',
  'foot-less-body',
  'bore-out-of-round',
  'bore-taper',
];

const agreementOf = (first: Fact, second: Fact): Agreement => {
  const { dimension, unit } = first.value;
  const small = unit === 'in' && SMALL.includes(first.quantity);
  const shown = small ? 'thou' : unit;
  const wanted = jointUncertainty(first, second) * 2;
  const step = Math.abs(widthIn(dimension, wanted, shown));
  // Two figures of U say enough of every value beside it.
  const places =
    step === 0 ? decimalsOf(first.value.text) : Math.max(0, 1 - Math.floor(Math.log10(step)));
  const write = (quantity: Fact['value']): Written => ({
    text: asciiIn(quantity, shown, places),
    unit: shown,
  });
  return {
    quantity: first.quantity,
    first: write(first.value),
    second: write(second.value),
    difference: write(minus(second.value, first.value)),
    expandedUncertainty: { text: formatWidth(dimension, wanted, shown, places), unit: shown },
    agree: agrees(first, second),
  };
};

/**
 * Every figure that both sets gave: means and single values. A second set that read no lifter of its own
 * took over the first one's, and there is nothing to compare.
 */
export const agreementsOf = (
  first: readonly Fact[],
  second: readonly Fact[],
  readInSecond: ReadonlySet<QuantityName>,
): readonly Agreement[] =>
  first.flatMap((fact): readonly Agreement[] => {
    const { quantity, figure } = fact;
    const own = readingsFor(quantity).some((name) => readInSecond.has(name));
    if (!own || (figure !== undefined && figure !== 'mean')) return [];
    const other = second.find((one) => one.quantity === quantity && one.figure === figure);
    return other === undefined ? [] : [agreementOf(fact, other)];
  });
