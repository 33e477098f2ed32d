import { describe, expect, it } from 'vitest';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import { WHOLE_ENGINE } from '@/domain/inspection/capture/rows';
import { body, findingOf, GAUGES, inches, RULES, reading } from './build';

const scale: GaugeRecord = {
  id: 'scale',
  code: 'SC-01',
  kind: 'scale',
  calibratedOn: '2026-03-02',
  dueOn: '2027-03-02',
};

const lift = (gauge: GaugeRecord, text: string) =>
  findingOf('4.5', {
    gauges: [...GAUGES, gauge],
    readings: [reading('r1', text, { quantity: 'valve-lift', gaugeId: gauge.id })],
  }).perPosition[0];

describe('a gauge of which neither certificate nor division is known', () => {
  it.each(['0.4700', '0.4900'])('makes no statement on %s, whichever side it falls', (text) => {
    expect(lift({ ...scale, kind: 'other' }, text)).toMatchObject({
      state: 'no-statement',
      pass: null,
      fit: false,
      value: { text, unit: 'in' },
    });
    expect(lift(scale, text)?.sentence).toMatch(
      /no statement, since the gauge’s error is not known\.$/,
    );
  });

  it('makes one as soon as either is known', () => {
    const division = { ...scale, division: inches('0.0001') };
    expect(lift(division, '0.4700')).toMatchObject({ state: 'within', pass: true, fit: true });
    const certificate = {
      number: 'C-1',
      expandedUncertainty: inches('0.0002'),
      coverageFactor: '2',
    };
    expect(lift({ ...scale, certificate }, '0.4900')).toMatchObject({
      state: 'outside',
      pass: false,
    });
  });

  it('is not mended by a division of another dimension', () => {
    const kilograms = { ...scale, division: { text: '0.5', unit: 'kg' } };
    expect(lift(kilograms, '0.4700')?.state).toBe('no-statement');
  });

  it('holds for what is worked out from its readings, and for lifters', () => {
    const readings = [
      reading('r1', '4.0000', {
        quantity: 'cylinder-bore',
        gaugeId: 'scale',
        place: { ...WHOLE_ENGINE, bank: 'block', cylinder: '1' },
      }),
      reading('r2', '3.4800', { quantity: 'stroke', gaugeId: 'mic', place: WHOLE_ENGINE }),
    ];
    const gauges = [...GAUGES, scale];
    const { perPosition } = findingOf('3.1', { gauges, readings });
    expect(perPosition[0]).toMatchObject({ state: 'no-statement', fit: false });
    const lifter = findingOf('4.2', {
      gauges,
      rules: RULES,
      readings: [body('r1', '0.8423', { gaugeId: 'scale' })],
    }).perPosition[0];
    expect(lifter).toMatchObject({ state: 'no-statement', pass: null, fit: false });
  });
});
