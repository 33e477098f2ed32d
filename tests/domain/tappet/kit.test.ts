import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import type { LimitRequirement } from '@/domain/decision/requirement';
import type { Gauge } from '@/domain/measurement/gauge';
import { combine } from '@/domain/measurement/uncertainty';
import { kitFitness } from '@/domain/tappet/budget/kit';
import { footAgainstBody } from '@/domain/tappet/foot';
import { measureBore } from '@/domain/tappet/measure-bore';
import { inches } from '../quantity/build';
import { grid, sheet } from './build';

const flatTappet: LimitRequirement<'length'> = {
  limits: { min: inches('0.0013'), max: inches('0.0019') },
  decisionRule: { kind: 'guarded-rejection' },
  comparison: { method: 'absolute' },
};

const certified = (kind: Gauge['kind'], expanded = '0.00005'): Gauge<'length'> => ({
  kind,
  division: inches('0.0001'),
  certificate: { expandedUncertainty: inches(expanded), coverageFactor: 2 },
});

describe('is the gauge fit for a window of 0.0006 in? (common practice, by computation)', () => {
  it.each([
    [
      'calipers',
      { method: 'absolute', gauge: { kind: 'caliper' }, lifterGauge: { kind: 'caliper' } },
    ],
    [
      'a telescoping gauge and a micrometer',
      {
        method: 'absolute',
        gauge: { kind: 'telescoping-gauge' },
        lifterGauge: certified('micrometer'),
      },
    ],
  ] as const)('no: %s', (_, kit) => {
    const found = kitFitness(kit, flatTappet);
    expect(found?.fit).toBe(false);
    // More than the whole window by itself.
    expect(found?.expandedUncertainty).toBeGreaterThan(0.0006 * 0.0254);
    expect(found?.ratio).toBeLessThan(0.5);
    expect(found?.budget[0]?.words).toMatch(/calibration/);
  });

  it.each([
    ['certified, comparative', { method: 'comparative', gauge: certified('dial-bore-gauge') }],
    [
      'certified, absolute',
      {
        method: 'absolute',
        gauge: certified('dial-bore-gauge'),
        lifterGauge: certified('micrometer'),
      },
    ],
    [
      'certified, on a setting ring',
      {
        method: 'comparative',
        zeroSize: inches('0.8430'),
        gauge: certified('dial-bore-gauge'),
        lifterGauge: certified('micrometer'),
        settingRing: certified('setting-ring', '0.00002'),
      },
    ],
    ['checked on its standard, comparative', { method: 'comparative' }],
    ['checked on its standard, absolute', { method: 'absolute' }],
  ] as const)('yes: a sound kit of 0.0001 in, %s', (_, kit) => {
    const found = kitFitness(kit, flatTappet);
    expect(found?.ratio).toBeGreaterThan(2);
    expect(found?.fit).toBe(true);
  });

  it('the same calipers on a bore: the reading is kept, nothing is stated', () => {
    const measured = measureBore(
      sheet({
        method: 'absolute',
        gauge: { kind: 'caliper' },
        lifterGauge: { kind: 'caliper' },
        lifter: [inches('0.842')],
        bore: grid([
          ['0.844', '0.844'],
          ['0.844', '0.844'],
        ]),
      }),
    );
    const value = measured.clearance?.mean ?? inches('0');
    expect(value.text).toBe('0.002');
    expect(assess(flatTappet, { value, ...measured })).toMatchObject({
      fit: false,
      complies: null,
      assessment: 'too-close',
    });
  });
});

describe('the budget of a sheet', () => {
  it('takes repeatability from a study when one is given', () => {
    const bore = grid([
      ['0.0016', '0.0017'],
      ['0.0016', '0.0017'],
    ]);
    const of = (standardDeviation: number) =>
      measureBore(sheet({ bore, repeatability: { standardDeviation, degreesOfFreedom: 20 } }));
    expect(of(0.0002 * 0.0254).standardUncertainty).toBeGreaterThan(
      of(0.00001 * 0.0254).standardUncertainty,
    );
    expect(of(0.0002 * 0.0254).budget[0]).toMatchObject({ name: 'repeatability' });
    expect(of(0.0002 * 0.0254).degreesOfFreedom).toBeGreaterThan(19);
  });

  it('more repeats at every place make the mean better', () => {
    const repeatability = { standardDeviation: 0.0001 * 0.0254, degreesOfFreedom: 30 };
    const one = measureBore(sheet({ bore: grid([['0.0016']]), repeatability }));
    const four = measureBore(
      sheet({ bore: grid([[['0.0016', '0.0016', '0.0017', '0.0017']]]), repeatability }),
    );
    expect(four.standardUncertainty).toBeLessThan(one.standardUncertainty);
  });

  it('counts drift, and the temperature logged or not', () => {
    const names = (over: Parameters<typeof sheet>[0]) =>
      measureBore(sheet({ bore: grid([['0.0016']]), ...over })).budget.map((line) => line.name);
    expect(names({})).toContain('temperature: not logged');
    expect(names({ zeros: { opening: inches('0'), closing: inches('0.0001') } })).toContain(
      'zero drift',
    );
    expect(names({ lifter: [inches('0.8422'), inches('0.8423')] })).toContain('form: lifter');
  });
});

describe('foot against body', () => {
  it('is the foot at its largest less the body at its widest', () => {
    const found = footAgainstBody(
      [inches('0.8483'), inches('0.8485')],
      [inches('0.8423'), inches('0.8421')],
      'in',
    );
    expect(found?.difference.text).toBe('0.0062');
    const u = combine(found?.components ?? []).standardUncertainty / 0.0254;
    expect(u).toBeGreaterThan(0.00003);
    expect(u).toBeLessThan(0.0001);
    expect(footAgainstBody([], [inches('0.8423')], 'in')).toBeNull();
  });

  it('a foot 0.0062 in larger breaches a clause of at most 0.0010 in', () => {
    const found = footAgainstBody([inches('0.8485')], [inches('0.8423')], 'in');
    if (found === null) throw new Error('no foot');
    const clause: LimitRequirement<'length'> = {
      limits: { max: inches('0.0010') },
      decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
      comparison: { method: 'absolute' },
    };
    expect(assess(clause, { value: found.difference, ...combine(found.components) })).toMatchObject(
      { complies: false, assessment: 'outside' },
    );
  });
});
