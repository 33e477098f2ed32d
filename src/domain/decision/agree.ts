import type { Dimension } from '../quantity/dimension';
import type { Quantity } from '../quantity/quantity';
import { assess } from './assess';

/** A value of an independent measurement, with its standard uncertainty in the base of the dimension. */
export interface Independent<D extends Dimension = Dimension> {
  readonly value: Quantity<D>;
  readonly standardUncertainty: number;
}

/** Of the difference of two independent values: √(u₁² + u₂²) (JCGM 100:2008, 5.1.2). */
export const jointUncertainty = (first: Independent, second: Independent): number =>
  Math.hypot(first.standardUncertainty, second.standardUncertainty);

/** Whether a second value differs from a first by no more than their joint U. */
export const agrees = (first: Independent, second: Independent): boolean =>
  assess(
    {
      limits: { min: first.value, max: first.value },
      decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
      comparison: { method: 'absolute' },
      fitRatio: '0',
    },
    { value: second.value, standardUncertainty: jointUncertainty(first, second) },
  ).complies === true;
