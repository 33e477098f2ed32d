import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { scaledText } from '@/domain/quantity/decimal-text';
import { compareQuantities, minus } from '@/domain/quantity/quantity';
import type { PlaceReading } from '@/domain/tappet/bore-sheet';
import { measureBore } from '@/domain/tappet/measure-bore';
import { inches } from '../quantity/build';
import { sheet } from './build';

const size = (tenMillionths: number) => inches(scaledText(BigInt(tenMillionths), 7));
const sizes = fc.array(fc.integer({ min: 8_420_000, max: 8_430_000 }), {
  minLength: 1,
  maxLength: 4,
});
const places = fc.array(
  fc.record({
    depth: fc.constantFrom('above', 'gallery', 'below'),
    axis: fc.constantFrom('along', 'across'),
    bore: fc.integer({ min: 8_430_000, max: 8_450_000 }),
  }),
  { minLength: 1, maxLength: 12 },
);
type PlaceOf = { readonly depth: string; readonly axis: string; readonly bore: number };
const reading = ({ depth, axis, bore }: PlaceOf, less = 0): PlaceReading => ({
  depth,
  axis,
  reading: size(bore - less),
});

describe('properties of a sheet', () => {
  it('comparative with the zero at the widest equals absolute, and so does a setting ring of any size', () => {
    fc.assert(
      fc.property(
        sizes,
        places,
        fc.integer({ min: 8_400_000, max: 8_460_000 }),
        (lifters, bores, ring) => {
          const lifter = lifters.map(size);
          const widest = Math.max(...lifters);
          const absolute = measureBore(
            sheet({ method: 'absolute', lifter, bore: bores.map((one) => reading(one)) }),
          );
          const comparative = measureBore(
            sheet({ lifter, bore: bores.map((one) => reading(one, widest)) }),
          );
          const onRing = measureBore(
            sheet({ lifter, zeroSize: size(ring), bore: bores.map((one) => reading(one, ring)) }),
          );
          for (const other of [comparative, onRing]) {
            expect(other.clearance).toEqual(absolute.clearance);
            expect(other.outOfRound).toEqual(absolute.outOfRound);
            expect(other.taper).toEqual(absolute.taper);
          }
        },
      ),
    );
  });

  it('the order of repeats does not matter', () => {
    const shuffledRepeats = fc
      .array(fc.integer({ min: 10_000, max: 30_000 }), { minLength: 2, maxLength: 8 })
      .chain((repeats) =>
        fc.tuple(
          fc.constant(repeats),
          fc.shuffledSubarray(repeats, { minLength: repeats.length, maxLength: repeats.length }),
        ),
      );
    fc.assert(
      fc.property(shuffledRepeats, ([one, other]) => {
        const of = (repeats: readonly number[]) =>
          measureBore(
            sheet({
              bore: repeats.map((bore) => reading({ depth: 'above', axis: 'along', bore })),
            }),
          );
        expect(of(other)).toEqual(of(one));
      }),
    );
  });

  it('smallest ≤ mean ≤ largest, and a larger lifter takes off exactly its difference', () => {
    fc.assert(
      fc.property(sizes, places, fc.nat(5_000), (lifters, bores, more) => {
        const of = (by: number) =>
          measureBore(
            sheet({
              method: 'absolute',
              lifter: lifters.map((one) => size(one + by)),
              bore: bores.map((one) => reading(one)),
            }),
          ).clearance;
        const [before, after] = [of(0), of(more)];
        if (before === null || after === null) throw new Error('no clearance');
        expect(compareQuantities(before.min, before.mean)).toBeLessThanOrEqual(0);
        expect(compareQuantities(before.mean, before.max)).toBeLessThanOrEqual(0);
        for (const figure of ['mean', 'min', 'max'] as const)
          expect(compareQuantities(minus(before[figure], after[figure]), size(more))).toBe(0);
      }),
    );
  });
});
