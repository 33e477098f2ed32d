import fc from 'fast-check';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { GaugeStrip, type GaugeStripProps } from '@/components/look/GaugeStrip';
import { diamondHalf, measures } from '@/components/look/strip/measures';
import { guardBands, stripScale } from '@/domain/decision/strip-scale';

const clearance: GaugeStripProps = {
  min: { value: 1.3, label: '1.3 min' },
  max: { value: 1.9, label: '1.9 max' },
  reading: { value: 1.8, label: '1.80' },
  uncertainty: 0.15,
  guard: { kind: 'acceptance', width: 0.15 },
  unit: '0.001 in',
  status: 'too-close',
};
const draw = (props: GaugeStripProps) => renderToStaticMarkup(<GaugeStrip {...props} />);
const bars = (html: string) =>
  [...html.matchAll(/<rect x="([\d.]+)%?" width="([\d.]+)%"/g)].map((m) => [
    Number(m[1]),
    Number(m[2]),
  ]);

describe('the scale of a strip', () => {
  const value = fc.double({ min: -1e4, max: 1e4, noNaN: true });
  const positive = fc.double({ min: 1e-6, max: 1e3, noNaN: true });

  it('shows every limit, the guard bands and all of reading ± U', () => {
    fc.assert(
      fc.property(
        value,
        positive,
        value,
        positive,
        positive,
        (min, band, reading, uncertainty, width) => {
          const input = {
            min,
            max: min + band,
            reading,
            uncertainty,
            guard: { kind: 'rejection' as const, width },
          };
          const { at } = stripScale(input);
          for (const point of [min, min + band, reading - uncertainty, reading + uncertainty])
            expect(at(point)).toBeGreaterThanOrEqual(0);
          for (const [from, to] of guardBands(input)) {
            expect(at(from)).toBeGreaterThanOrEqual(0);
            expect(at(to)).toBeLessThanOrEqual(100);
          }
          expect(at(reading + uncertainty)).toBeLessThanOrEqual(100);
        },
      ),
    );
  });

  it('leaves room beyond each limit, so that the forbidden side is seen', () => {
    const { at } = stripScale({ min: 1.3, max: 1.9, reading: 1.6, uncertainty: 0.05 });
    expect(at(1.3)).toBeGreaterThan(15);
    expect(at(1.9)).toBeLessThan(85);
  });

  it('starts at zero where all is positive, and has a readable number of ticks', () => {
    const scale = stripScale({ max: 0.001, reading: 0.0062, uncertainty: 0.0002 });
    expect(scale.from).toBe(0);
    expect(scale.ticks.length).toBeGreaterThan(8);
    expect(scale.ticks.length).toBeLessThan(22);
  });
});

describe('guard bands', () => {
  it('lie within the limits for guarded acceptance', () => {
    const guard = { kind: 'acceptance', width: 0.25 } as const;
    expect(guardBands({ min: 1, max: 2, guard })).toEqual([
      [1, 1.25],
      [1.75, 2],
    ]);
  });

  it('lie beyond the limits for guarded rejection', () => {
    const guard = { kind: 'rejection', width: 0.25 } as const;
    expect(guardBands({ min: 1, max: 2, guard })).toEqual([
      [0.75, 1],
      [2, 2.25],
    ]);
  });
});

describe('the strip', () => {
  it('bars the forbidden side from each post outward', () => {
    const { at } = stripScale({
      ...{ min: 1.3, max: 1.9, reading: 1.8, uncertainty: 0.15 },
      guard: clearance.guard,
    });
    expect(bars(draw(clearance))).toEqual(
      expect.arrayContaining([
        [0, at(1.3)],
        [at(1.9), 100 - at(1.9)],
      ]),
    );
  });

  it('bars one side only for a one-sided limit', () => {
    const { min: _, guard: __, ...oneSided } = clearance;
    const found = bars(draw(oneSided)).filter(([, width]) => width !== 100);
    expect(found).toHaveLength(1);
    expect(found[0]?.[0]).toBeGreaterThan(0);
  });

  it('never hides the whiskers behind the diamond, down to 6 px of U', () => {
    for (const size of ['table', 'measuring', 'print'] as const)
      for (const px of [6, 8, 15, 40, 200])
        expect(diamondHalf(measures[size], px)).toBeLessThan(px);
  });

  it('says in words what it shows', () => {
    expect(draw(clearance)).toContain(
      'aria-label="reading 1.80, uncertainty 0.15, 1.3 min, 1.9 max, in 0.001 in: too close to call"',
    );
    expect(draw({ unit: 'in', max: { value: 1, label: 'max 1 in' } })).toContain('no reading');
  });

  it('keeps the reading blue even outside, and black in print', () => {
    const outside = {
      ...clearance,
      reading: { value: 2.2, label: '2.20' },
      status: 'outside',
    } as const;
    expect(draw(outside)).toContain('--color-marking');
    expect(draw(outside)).not.toContain('--color-outside');
    expect(draw({ ...outside, size: 'print' })).not.toContain('--color-marking');
  });

  it('has its three heights', () => {
    expect(draw({ ...clearance, size: 'table' })).toContain('height="22"');
    expect(draw(clearance)).toContain('height="92"');
    expect(draw({ ...clearance, size: 'print' })).toContain('height="98"');
  });

  it('joins the labels of limits that stand too close together to be written apart', () => {
    const far = draw({ ...clearance, guard: undefined, reading: { value: 9, label: '9.00' } });
    expect(far).toContain('1.3 min, 1.9 max');
    expect(draw(clearance)).not.toContain('1.3 min, 1.9 max</text>');
  });
});
