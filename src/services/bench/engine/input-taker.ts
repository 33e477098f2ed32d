import type { Input } from '@/domain/engine/derived';
import type { Dimension } from '@/domain/quantity/dimension';
import { type Figure, Taker } from '../take';

type Figures = Readonly<Record<string, unknown>>;

/** Takes the named inputs of an engine quantity, each with its uncertainty where one is stated. */
export class InputTaker extends Taker {
  readonly #inputs: Figures;
  readonly #uncertainties: Readonly<Record<string, Figure | undefined>>;

  constructor(
    inputs: Figures & {
      readonly uncertainties?: Readonly<Record<string, Figure | undefined>> | undefined;
    },
  ) {
    super();
    this.#inputs = inputs;
    this.#uncertainties = inputs.uncertainties ?? {};
  }

  unitOf(name: string, dimension: Dimension): string {
    return this.unit(`/inputs/${name}`, String(this.#inputs[name]), dimension);
  }

  /** May be zero or negative. */
  input<D extends Dimension>(name: string, dimension: D, unit?: string): Input<D> {
    const value = this.quantity(`/inputs/${name}`, this.#inputs[name] as Figure, dimension, unit);
    return { value, standardUncertainty: this.uncertaintyOf(name, dimension, value.unit) };
  }

  /** Larger than zero. */
  sized<D extends Dimension>(name: string, dimension: D, unit?: string): Input<D> {
    const value = this.size(`/inputs/${name}`, this.#inputs[name] as Figure, dimension, unit);
    return { value, standardUncertainty: this.uncertaintyOf(name, dimension, value.unit) };
  }

  uncertaintyOf(name: string, dimension: Dimension, unit: string): number | undefined {
    return this.width(`/inputs/uncertainties/${name}`, this.#uncertainties[name], dimension, unit);
  }
}
