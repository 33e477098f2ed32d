import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { calibrationState, type Gauge, reaches } from '@/domain/measurement/gauge';
import { calibrationOf, divisionOf, resolutionOf } from '@/domain/measurement/gauge-figures';
import { pooledRepeatability } from '@/domain/measurement/repeatability';
import { mean, range } from '@/domain/measurement/series';
import { getUnit } from '@/domain/quantity/find-unit';
import { div, equal, fromDecimalText, mul, rational, toNumber } from '@/domain/quantity/rational';
import { inches } from '../quantity/build';

const values = (...texts: string[]) => texts.map((text) => inches(text).value);

describe('pooled repeatability', () => {
  it('comes from true repeats only, each group about its own mean', () => {
    // By hand: deviations 0.5, 0.5 and 1, 0, 1 tenths: Σ = 2.5 over 1 + 2 degrees of freedom.
    const found = pooledRepeatability([
      values('0.8440', '0.8441'),
      values('0.8450', '0.8451', '0.8452'),
      values('0.8500'),
    ]);
    expect(found?.degreesOfFreedom).toBe(3);
    expect((found?.standardDeviation ?? 0) / 0.0254).toBeCloseTo(0.0001 * Math.sqrt(2.5 / 3), 15);
  });

  it('is nothing without a repeat', () => {
    expect(pooledRepeatability([values('0.8440'), values('0.8444')])).toBeNull();
    expect(pooledRepeatability([])).toBeNull();
  });

  it('does not mind the order, nor how large the values are', () => {
    const group = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 2, maxLength: 6 });
    fc.assert(
      fc.property(
        fc.array(group, { minLength: 1, maxLength: 4 }),
        fc.bigInt(0n, 10n ** 12n),
        (groups, base) => {
          const of = (list: readonly number[], at: bigint) =>
            list.map((n) => rational(at + BigInt(n), 10_000n));
          const plain = pooledRepeatability(groups.map((list) => of(list, 0n)));
          const moved = pooledRepeatability(groups.map((list) => of([...list].reverse(), base)));
          expect(moved).toEqual(plain);
        },
      ),
    );
  });

  it('series are exact', () => {
    const three = values('0.1', '0.2', '0.4');
    const seven = mul(fromDecimalText('0.7'), getUnit('length', 'in').factor);
    expect(equal(mean(three), div(seven, rational(3n)))).toBe(true);
    expect(toNumber(range(three)) / 0.0254).toBeCloseTo(0.3, 12);
  });
});

describe('gauges', () => {
  const micrometer: Gauge<'length'> = {
    kind: 'micrometer',
    division: inches('0.0001'),
    range: { from: inches('0'), to: inches('1') },
    certificate: { expandedUncertainty: inches('0.00005'), coverageFactor: 2 },
    calibratedOn: '2026-03-02',
    dueOn: '2027-03-02',
  };

  it('is in calibration from its day to the due day', () => {
    expect(
      ['2026-03-01', '2026-03-02', '2027-03-02', '2027-03-03'].map((on) =>
        calibrationState(micrometer, on),
      ),
    ).toEqual(['not-yet', 'in-calibration', 'in-calibration', 'overdue']);
    expect(calibrationState({ kind: 'caliper' }, '2026-03-02')).toBe('never');
  });

  it('reaches the sizes of its range, ends included', () => {
    expect(['0', '0.8440', '1', '1.0001'].map((text) => reaches(micrometer, inches(text)))).toEqual(
      [true, true, true, false],
    );
    expect(reaches({ kind: 'caliper' }, inches('6'))).toBe(true);
  });

  it('takes U ÷ k from the certificate, else common practice', () => {
    expect(calibrationOf(micrometer, 'it').standardUncertainty / 0.0254).toBeCloseTo(0.000025, 12);
    expect(
      calibrationOf({ kind: 'telescoping-gauge' }, 'it').standardUncertainty / 0.0254,
    ).toBeCloseTo(0.001 / Math.sqrt(3), 12);
    expect(calibrationOf({ kind: 'scale' }, 'it').standardUncertainty).toBe(0);
  });

  it('reads to whole divisions', () => {
    expect(toNumber(divisionOf({ kind: 'caliper' })) / 0.0254).toBeCloseTo(0.001, 15);
    expect(resolutionOf(micrometer, 'it').standardUncertainty / 0.0254).toBeCloseTo(
      0.0001 / Math.sqrt(12),
      15,
    );
  });
});
