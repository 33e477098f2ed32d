import { describe, expect, it } from 'vitest';
import { minus } from '@/domain/quantity/quantity';
import { measureBore } from '@/domain/tappet/measure-bore';
import { checkValue, provenance } from '../../support/check-value';
import { inches } from '../quantity/build';
import { absoluteTexts, clearanceTexts, grid, sheet } from './build';

const texts = (value: unknown): readonly string[] => [value].flat().map(String);

describe('clearance of diameters', () => {
  const one = checkValue('clr-absolute-iron-904');
  it(`${provenance(one)}`, () => {
    const found = absoluteTexts(texts(one.inputs['bore_in']), texts(one.inputs['lifter_in']));
    expect(Number(found?.mean)).toBe(one.expected['clearance_in']);
  });

  const stack = checkValue('clr-stack-31mm');
  it(`tolerance stack: ${provenance(stack)}`, () => {
    const found = absoluteTexts(
      texts(stack.inputs['bore_mm']),
      texts(stack.inputs['lifter_mm']),
      'mm',
    );
    expect([Number(found?.min), Number(found?.max)]).toEqual([
      stack.expected['min_mm'],
      stack.expected['max_mm'],
    ]);
  });

  const imperial = checkValue('clr-stack-imperial');
  it(`tolerance stack: ${provenance(imperial)}`, () => {
    const found = absoluteTexts(
      texts(imperial.inputs['bore_in']),
      texts(imperial.inputs['tappet_in']),
    );
    expect([Number(found?.min), Number(found?.max)]).toEqual([
      imperial.expected['min_in'],
      imperial.expected['max_in'],
    ]);
  });

  const misprinted = checkValue('clr-misprinted-table');
  it(`is recomputed, never copied from a sheet: ${provenance(misprinted)}`, () => {
    expect(misprinted.reproduced).toBe(false);
    const found = absoluteTexts(
      texts(misprinted.inputs['bore_mm']),
      texts(misprinted.inputs['tappet_mm']),
      'mm',
    );
    expect(found).toMatchObject({ min: '0.016', max: '0.052' });
    expect(Number(found?.min)).not.toBeCloseTo(misprinted.expected['min_mm'] as number, 3);
    expect(Number(found?.max)).not.toBeCloseTo(misprinted.expected['max_mm'] as number, 3);
  });

  const full = checkValue('clr-multi-constructed');
  it(`a full sheet: ${provenance(full)}`, () => {
    const rows = full.inputs['bore_in[depth][axis]'] as readonly (readonly number[])[];
    const found = measureBore(
      sheet({
        method: 'absolute',
        lifter: (full.inputs['lifter_in'] as readonly number[]).map((size) => inches(String(size))),
        bore: grid(rows.map((row) => row.map(String))),
      }),
    );
    const expected = full.expected as Record<string, number>;
    const near = (text: string | undefined, name: string) =>
      expect(Math.abs(Number(text) - (expected[name] ?? Number.NaN)), name).toBeLessThan(
        full.tolerance as number,
      );
    near(found.clearance?.mean.text, 'clr_mean');
    near(found.clearance?.min.text, 'clr_min');
    near(found.clearance?.max.text, 'clr_max');
    near(found.outOfRound?.text, 'out_of_round');
    near(found.taper?.depthMeans.text, 'taper_of_depth_means');
    near(found.taper?.worstAxis.text, 'taper_worst_axis');
    expect(found.taper?.signed.text).toBe('-0.00035');
    expect(found.missing).toEqual([]);
  });
});

describe('trade facts (common practice)', () => {
  it('0.8440 less 0.8422 is 0.0018 exactly', () => {
    expect(minus(inches('0.8440'), inches('0.8422')).text).toBe('0.0018');
  });

  it('0.0020 in suits a roller and is too loose for a flat tappet', async () => {
    const { assess } = await import('@/domain/decision/assess');
    const within = (min: string, max: string) =>
      assess(
        {
          limits: { min: inches(min), max: inches(max) },
          decisionRule: { kind: 'simple' },
          comparison: { method: 'absolute' },
        },
        { value: inches('0.0020'), standardUncertainty: 0 },
      ).complies;
    expect(within('0.0013', '0.0019')).toBe(false);
    expect(within('0.0020', '0.0030')).toBe(true);
  });
});

describe('comparative readings', () => {
  const zeros = (opening: string, closing: string) => ({
    opening: inches(opening),
    closing: inches(closing),
  });

  it('without a size, the reading is the smallest clearance there and the lifter is not taken off again', () => {
    const found = measureBore(
      sheet({
        bore: grid([
          ['0.0017', '0.0018'],
          ['0.0016', '0.0017'],
        ]),
      }),
    );
    expect(clearanceTexts(found)).toEqual({ mean: '0.0017', min: '0.0016', max: '0.0018' });
    const withLifter = measureBore(
      sheet({
        lifter: [inches('0.8423'), inches('0.8421')],
        bore: grid([
          ['0.0017', '0.0018'],
          ['0.0016', '0.0017'],
        ]),
      }),
    );
    expect(clearanceTexts(withLifter)).toEqual({ mean: '0.0018', min: '0.0016', max: '0.002' });
  });

  it('with a setting ring of size S, bore = S + reading, and the lifter is taken off', () => {
    const found = measureBore(
      sheet({
        zeroSize: inches('0.8430'),
        lifter: [inches('0.8423')],
        bore: grid([['0.0010', '0.0012']]),
      }),
    );
    expect(clearanceTexts(found)).toEqual({ mean: '0.0018', min: '0.0017', max: '0.0019' });
    expect(
      measureBore(sheet({ zeroSize: inches('0.8430'), bore: grid([['0.0010']]) })),
    ).toMatchObject({
      clearance: null,
      missing: ['lifter diameter', 'a second depth', 'a second axis'],
    });
  });

  it('reads thousandths where the dial does', () => {
    const found = measureBore(sheet({ bore: grid([['1.7', '1.8']], 'thou') }));
    expect(clearanceTexts(found)).toEqual({ mean: '0.00175', min: '0.0017', max: '0.0018' });
  });

  it('turns a dial on which larger reads minus, after the drift', () => {
    const gauge = {
      kind: 'dial-bore-gauge',
      division: inches('0.0001'),
      largerReads: 'minus',
    } as const;
    const found = measureBore(
      sheet({ gauge, bore: grid([['-0.0017', '−0.0018']]), zeros: zeros('0', '0.0003') }),
    );
    // −(−0.0017 − 0.0001) and −(−0.0018 − 0.0002).
    expect(clearanceTexts(found)).toEqual({ mean: '0.0019', min: '0.0018', max: '0.002' });
  });

  it('shares drift in taking order: reading i of n loses opening + (closing − opening)·i ÷ (n + 1)', () => {
    const bore = (order: readonly number[]) =>
      grid(
        [
          ['0.0020', '0.0020'],
          ['0.0020', '0.0020'],
        ],
        'in',
        order,
      );
    const of = (order: readonly number[]) =>
      measureBore(sheet({ bore: bore(order), zeros: zeros('0.0001', '0.0006') }));
    const found = of([1, 2, 3, 4]);
    expect(clearanceTexts(found)).toEqual({ mean: '0.00165', min: '0.0015', max: '0.0018' });
    expect(found.drift?.text).toBe('0.0005');
    expect(found.taper?.signed.text).toBe('0.0002');
    expect(of([4, 3, 2, 1]).taper?.signed.text).toBe('-0.0002');
  });

  it('shares drift over a run of several bores', () => {
    const found = measureBore(
      sheet({
        bore: grid([['0.0020']], 'in', [31]),
        zeros: { ...zeros('0', '0.0003'), readingsInRun: 61 },
      }),
    );
    expect(found.clearance?.mean.text).toBe('0.00185');
  });

  it('takes repeats as one place, and keeps them out of form', () => {
    const found = measureBore(
      sheet({
        bore: grid([
          [['0.0016', '0.0018'], '0.0017'],
          ['0.0017', '0.0017'],
        ]),
      }),
    );
    expect(found.outOfRound?.text).toBe('0');
    expect(found.taper).toMatchObject({ shape: 'straight' });
    expect(found.budget.find((line) => line.name === 'repeatability')).toMatchObject({
      degreesOfFreedom: 1,
    });
    expect(found.warnings.join(' ')).not.toContain('read twice');
  });
});

describe('a sheet with faults', () => {
  it('names what is missing and still computes what it can', () => {
    const found = measureBore(
      sheet({
        bore: grid([
          ['0.0017', ''],
          ['0.0016', '0.0017'],
        ]),
        zeros: { opening: inches('0') },
      }),
    );
    expect(found.missing).toEqual(['depth 1, axis 2', 'closing zero']);
    expect(found.clearance?.min.text).toBe('0.0016');
    expect(measureBore(sheet({ method: 'absolute' }))).toMatchObject({
      clearance: null,
      outOfRound: null,
      taper: null,
      missing: ['bore readings', 'lifter diameter'],
    });
  });

  it('points out the typical errors', () => {
    const said = (over: Parameters<typeof sheet>[0]) => measureBore(sheet(over)).warnings.join(' ');
    expect(said({ bore: grid([['-0.0017']]) })).toContain('below zero');
    expect(said({ bore: grid([['0.8440']]) })).toContain('larger than any tappet');
    expect(
      said({ bore: grid([['0.0017']]), lifter: [inches('0.842'), inches('0.842')] }),
    ).toContain('nominal size');
    expect(said({ bore: grid([['0.0017']]) })).toContain('No opening and closing zero');
  });

  it('gives faults of a grid by cell', () => {
    expect(() => grid([['0.0017', '1,234']])).toThrow('could be');
  });
});
