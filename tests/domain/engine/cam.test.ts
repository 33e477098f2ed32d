import { describe, expect, it } from 'vitest';
import { compareWithCamCard } from '@/domain/engine/cam/cam-card';
import { grossLift, impliedRockerRatio, netLift } from '@/domain/engine/cam/lift';
import { durationAtLift, liftTableFault } from '@/domain/engine/cam/lift-table';
import { camTiming, centrelineOfEvents, durationOfEvents } from '@/domain/engine/cam/valve-events';
import type { Dimension } from '@/domain/quantity/dimension';
import { parseQuantity } from '@/domain/quantity/parse';
import type { Quantity } from '@/domain/quantity/quantity';
import { rational, toNumber } from '@/domain/quantity/rational';
import { checkValue, provenance } from '../../support/check-value';

const of = <D extends Dimension>(dimension: D, text: string): Quantity<D> => {
  const parsed = parseQuantity(text, { dimension });
  if (!parsed.ok) throw new Error(parsed.failure.detail);
  return parsed.value;
};
const inch = (x: unknown) => ({ value: of('length', `${String(x)} in`) });
const deg = (x: unknown) => of('angle', `${String(x)} deg`);
const whole = (x: unknown) => rational(BigInt(x as number));

describe('lift', () => {
  const check = checkValue('valve-lift');
  const rocker = {
    lobeLift: inch(check.inputs['lobe_lift_in']),
    rockerRatio: { value: of('ratio', String(check.inputs['rocker_ratio'])) },
  };
  it(`gross and net (${provenance(check)})`, () => {
    expect(grossLift(rocker).value.text).toBe(String(check.expected['gross_in']));
    const net = netLift(rocker, inch(check.inputs['lash_in']));
    expect(net.value.text).toBe(String(check.expected['net_in']));
    expect(net.datum).toContain('0.02 in lash');
  });

  const implied = checkValue('rocker-implied');
  it(`implied rocker ratio (${provenance(implied)})`, () => {
    const found = impliedRockerRatio(
      inch(implied.inputs['valve_lift_in']),
      inch(implied.inputs['lobe_lift_in']),
    );
    expect(Math.abs(Number(found.value.text) - (implied.expected['ratio'] as number))).toBeLessThan(
      1e-4,
    );
  });

  it('the ratio carries its uncertainty: 1.5 × 0.001 and 0.3 × 0.01 in squares (constructed)', () => {
    const found = grossLift({
      lobeLift: { ...rocker.lobeLift, standardUncertainty: 0.001 * 0.0254 },
      rockerRatio: { ...rocker.rockerRatio, standardUncertainty: 0.01 },
    });
    expect((found.standardUncertainty ?? 0) / 0.0254).toBeCloseTo(Math.hypot(0.0015, 0.003), 12);
  });
});

describe('valve events', () => {
  const card = checkValue('cam-6-42');
  it(`duration, centreline and overlap (${provenance(card)})`, () => {
    const { IO_BTDC, IC_ABDC, EC_ATDC } = card.inputs;
    const duration = durationOfEvents(whole(IO_BTDC), whole(IC_ABDC));
    expect(toNumber(duration)).toBe(card.expected['duration']);
    expect(toNumber(centrelineOfEvents(duration, whole(IO_BTDC)))).toBe(
      card.expected['centerline_ATDC'],
    );
    const found = camTiming({
      intakeOpens: { value: deg(IO_BTDC) },
      intakeCloses: { value: deg(IC_ABDC) },
      exhaustOpens: { value: deg(48) },
      exhaustCloses: { value: deg(EC_ATDC) },
    });
    expect(found.overlap.value.text).toBe(String(card.expected['overlap']));
    expect(found.intakeDuration.value.text).toBe(String(card.expected['duration']));
    expect(found.intakeCentreline.value.text).toBe(String(card.expected['centerline_ATDC']));
    expect(found.exhaustDuration.value.text).toBe('240');
    expect(found.exhaustCentreline.value.text).toBe('108');
    expect(found.lobeSeparation.value.text).toBe('108');
  });

  const other = checkValue('cam-40-60');
  it(`full lift after top dead centre (${provenance(other)})`, () => {
    const duration = durationOfEvents(
      whole(other.inputs['open_BTDC']),
      whole(other.inputs['close_ABDC']),
    );
    expect(toNumber(duration)).toBe(other.expected['duration']);
    expect(toNumber(centrelineOfEvents(duration, whole(other.inputs['open_BTDC'])))).toBe(
      other.expected['full_lift_ATDC'],
    );
  });

  it('one degree at each event: √2 on a duration, half of that on a centreline (constructed)', () => {
    const event = (text: string) => ({ value: deg(text), standardUncertainty: 1 });
    const found = camTiming({
      intakeOpens: event('6'),
      intakeCloses: event('42'),
      exhaustOpens: event('48'),
      exhaustCloses: event('12'),
    });
    // (io + ic)/2 − io = (ic − io)/2, so the errors share no sign but half the size.
    expect(found.intakeDuration.standardUncertainty).toBeCloseTo(Math.SQRT2, 12);
    expect(found.intakeCentreline.standardUncertainty).toBeCloseTo(Math.SQRT1_2, 12);
    expect(found.overlap.standardUncertainty).toBeCloseTo(Math.SQRT2, 12);
    expect(found.lobeSeparation.standardUncertainty).toBeCloseTo(0.5, 12);
  });

  it('an event on the far side of its dead centre is negative', () => {
    const found = camTiming({
      intakeOpens: { value: deg(-5) },
      intakeCloses: { value: deg(41) },
      exhaustOpens: { value: deg(46) },
      exhaustCloses: { value: deg(-6) },
    });
    expect(found.overlap.value.text).toBe('-11');
    expect(found.overlap.working.join(' ')).toContain('−5');
  });
});

const points = (rows: readonly (readonly [string, string])[]) =>
  rows.map(([degree, lift]) => ({ degree: deg(degree), lift: of('length', `${lift} in`) }));

/** A lobe that rises 0.010 in over 4 degrees at its flanks; crosses 0.050 at 100 and at 320.5. */
const lobe = points([
  ['90', '0.000'],
  ['98', '0.045'],
  ['102', '0.055'],
  ['200', '0.300'],
  ['319', '0.053'],
  ['322', '0.047'],
  ['340', '0.000'],
]);

describe('duration from a lift table', () => {
  const checkingLift = of('length', '0.050 in');
  it('interpolates both flanks: 98 + 4·½ and 319 + 3·½ (constructed)', () => {
    const found = durationAtLift({ checkingLift, points: lobe });
    expect(found.opens.text).toBe('100');
    expect(found.closes.text).toBe('320.5');
    expect(found.value).toMatchObject({ text: '220.5', unit: 'deg' });
    expect(found.centreline.text).toBe('210.25');
    expect(found.largestLift.text).toBe('0.300');
    expect(found.warnings).toEqual([]);
    expect(found.standardUncertainty).toBeUndefined();
  });

  it('a reading exactly at the checking lift is the crossing', () => {
    const found = durationAtLift({
      checkingLift,
      points: points([
        ['0', '0.000'],
        ['10', '0.050'],
        ['50', '0.2'],
        ['90', '0.050'],
        ['99', '0'],
      ]),
    });
    expect(found.value.text).toBe('80');
  });

  it('the lift reading counts by the flank’s steepness: 0.0005 in at 400 and 500 deg/in', () => {
    const found = durationAtLift({
      checkingLift,
      points: lobe,
      degreeUncertainty: 0.1,
      liftUncertainty: 0.0005 * 0.0254,
    });
    const expected = Math.hypot(0.1, 0.0005 * 400, 0.1, 0.0005 * 500);
    expect(found.standardUncertainty).toBeCloseTo(expected, 10);
  });

  it('a symmetric lobe has its centreline at its nose whatever the checking lift', () => {
    const rows = Array.from(
      { length: 61 },
      (_, i) =>
        [String(4 * i), ((0.3 * (1 - Math.cos((Math.PI * i) / 30))) / 2).toFixed(5)] as const,
    );
    for (const at of ['0.006 in', '0.050 in', '0.200 in']) {
      const found = durationAtLift({ checkingLift: of('length', at), points: points(rows) });
      expect(Number(found.centreline.text)).toBeCloseTo(120, 9);
    }
  });

  it('says when the lift rises again outside the lobe', () => {
    const bounce = [
      ...lobe,
      ...points([
        ['350', '0.060'],
        ['360', '0'],
      ]),
    ];
    expect(durationAtLift({ checkingLift, points: bounce }).warnings).toHaveLength(1);
  });

  it.each([
    [
      'too few rows',
      [
        ['0', '0'],
        ['1', '0.1'],
      ],
      0,
    ],
    [
      'degrees that do not rise',
      [
        ['0', '0'],
        ['5', '0.1'],
        ['5', '0'],
      ],
      2,
    ],
    [
      'nothing above the checking lift',
      [
        ['0', '0'],
        ['5', '0.04'],
        ['9', '0'],
      ],
      1,
    ],
    [
      'no opening flank',
      [
        ['0', '0.06'],
        ['5', '0.1'],
        ['9', '0'],
      ],
      0,
    ],
    [
      'no closing flank',
      [
        ['0', '0'],
        ['5', '0.1'],
        ['9', '0.06'],
      ],
      2,
    ],
  ] as const)('refuses %s, naming the row', (_, rows, row) => {
    const fault = liftTableFault({ checkingLift, points: points(rows) });
    expect(fault?.row).toBe(row);
    expect(() => durationAtLift({ checkingLift, points: points(rows) })).toThrow(RangeError);
  });
});

describe('declared cam card against found', () => {
  it('differences are exact and a difference equal to the tolerance agrees', () => {
    const found = compareWithCamCard([
      { name: 'duration', declared: deg('230'), found: deg('232'), tolerance: deg('2') },
      {
        name: 'lift',
        declared: inch('0.2900').value,
        found: inch('0.2931').value,
        tolerance: inch('0.003').value,
      },
      { name: 'centreline', declared: deg('106'), found: deg('105.5') },
      { name: 'overlap', declared: deg('30') },
    ]);
    expect(found.map(({ difference, agrees }) => [difference?.text, agrees])).toEqual([
      ['2', true],
      ['0.0031', false],
      ['-0.5', null],
      [undefined, null],
    ]);
  });
});
