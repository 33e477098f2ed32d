import type { Fault } from '@/domain/failure';
import { findMaterial, getMaterial, MATERIALS, type Material } from '@/domain/measurement/material';
import { widthFrom } from '@/domain/quantity/convert';
import type { Dimension } from '@/domain/quantity/dimension';
import { dimensionWords } from '@/domain/quantity/dimension';
import { findUnit, unitSymbols } from '@/domain/quantity/find-unit';
import { readNumber } from '@/domain/quantity/number-text';
import { parseQuantity } from '@/domain/quantity/parse';
import { type Quantity, quantityOf } from '@/domain/quantity/quantity';
import { zero } from '@/domain/quantity/rational';

export type Figure = string | number;

/**
 * Takes values out of a request one by one. A wrong one is noted with its place and replaced by
 * zero, so that all faults are found in one pass: look at `faults` before using anything taken.
 */
export class Taker {
  readonly faults: Fault[] = [];

  refuse(pointer: string, detail: string): void {
    this.faults.push({ pointer, detail });
  }

  /** The unit's own symbol. */
  unit(pointer: string, name: string, dimension: Dimension): string {
    const unit = findUnit(dimension, name);
    const symbols = unitSymbols(dimension);
    if (unit !== undefined) return unit.symbol;
    this.refuse(
      pointer,
      `"${name}" is no unit of ${dimensionWords(dimension)}. Write one of ${symbols.join(', ')}.`,
    );
    return symbols[0] ?? '';
  }

  quantity<D extends Dimension>(
    pointer: string,
    figure: Figure,
    dimension: D,
    defaultUnit?: string,
  ): Quantity<D> {
    const parsed = parseQuantity(String(figure), { dimension, defaultUnit });
    if (parsed.ok) return parsed.value;
    this.refuse(pointer, parsed.failure.detail);
    return quantityOf(dimension, zero, defaultUnit ?? unitSymbols(dimension)[0] ?? '');
  }

  /** A quantity that must be larger than zero. */
  size<D extends Dimension>(pointer: string, figure: Figure, dimension: D, defaultUnit?: string) {
    const before = this.faults.length;
    const quantity = this.quantity(pointer, figure, dimension, defaultUnit);
    if (this.faults.length === before && quantity.value.n <= 0n)
      this.refuse(pointer, 'This must be larger than zero.');
    return quantity;
  }

  /** By name, or by a coefficient of expansion per kelvin. */
  material(pointer: string, text: string): Material {
    const found = findMaterial(text);
    if (found !== undefined) return found;
    const names = MATERIALS.map(({ name }) => name).join(', ');
    this.refuse(pointer, `Write one of ${names}, or a coefficient per kelvin such as 11.4e-6.`);
    return getMaterial('steel');
  }

  /** Finite. */
  number(pointer: string, figure: Figure): number {
    const { plain } = readNumber(String(figure));
    const number = plain === undefined ? Number.NaN : Number(plain);
    if (Number.isFinite(number)) return number;
    this.refuse(pointer, `"${figure}" is not a number.`);
    return 0;
  }

  /** A standard uncertainty or another width, zero or more, in the base of its dimension. */
  width(
    pointer: string,
    figure: Figure | undefined,
    dimension: Dimension,
    unit: string,
  ): number | undefined {
    if (figure === undefined) return undefined;
    const width = this.number(pointer, figure);
    if (width < 0) this.refuse(pointer, 'An uncertainty is zero or more.');
    return widthFrom(dimension, Math.abs(width), unit);
  }
}
