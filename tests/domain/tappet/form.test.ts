import { describe, expect, it } from 'vitest';
import { rational } from '@/domain/quantity/rational';
import { type Shape, shapeOf } from '@/domain/tappet/form/shape';
import { measureBore } from '@/domain/tappet/measure-bore';
import { grid, sheet } from './build';

const tenths = (...values: readonly number[]) =>
  values.map((value) => rational(BigInt(value), 10_000n));

describe('the shape word', () => {
  it.each<readonly [readonly number[], Shape]>([
    [[5, 5], 'straight'],
    [[5, 6], 'straight'],
    [[5, 7], 'tapered'],
    [[5, 7, 9], 'tapered'],
    [[9, 7, 5], 'tapered'],
    [[9, 5, 5], 'bell-mouthed'],
    [[5, 5, 9], 'bell-mouthed'],
    [[5, 9, 9], 'tapered'],
    [[5, 8, 5], 'barrelled'],
    [[5, 6, 5], 'straight'],
    [[8, 5, 8], 'waisted'],
    [[8, 5, 5, 8], 'waisted'],
    [[5, 5, 8, 5], 'barrelled'],
    [[5], 'straight'],
  ])('depth means %j tenths over a division of one: %s', (means, shape) => {
    expect(shapeOf(tenths(...means), rational(1n, 10_000n))).toBe(shape);
  });
});

describe('form of one bore', () => {
  it('out-of-round is the largest difference between axes at one depth, three axes included', () => {
    const found = measureBore(
      sheet({
        bore: grid([
          ['0.0017', '0.0018', '0.0021'],
          ['0.0016', '0.0017', '0.0017'],
        ]),
      }),
    );
    expect(found.outOfRound?.text).toBe('0.0004');
    expect(found.taper?.worstAxis.text).toBe('0.0004');
  });

  it('needs two axes for roundness and two depths for taper', () => {
    expect(measureBore(sheet({ bore: grid([['0.0017'], ['0.0018']]) }))).toMatchObject({
      outOfRound: null,
      missing: ['a second axis'],
    });
    expect(measureBore(sheet({ bore: grid([['0.0017', '0.0018']]) }))).toMatchObject({
      taper: null,
      missing: ['a second depth'],
    });
  });
});
