import { describe, expect, it } from 'vitest';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import { withoutNewZero } from '@/domain/inspection/second-set/new-zero';
import { atIntake, body, inches, intake, reading, record, remark, zero } from './build';

const intakeOf = (more: Partial<InspectionRecord>) => {
  const found = assessInspection(record(more)).bores.find(({ key }) => key === '1 intake');
  if (found === undefined) throw new Error('no intake');
  return found;
};

const bodies = (second: string, by = 'other') => [
  body('b1', '0.8424'),
  body('b2', '0.8424', { axis: 'across' }),
  body('b11', second, { set: 2, takenBy: by }),
  body('b12', second, { set: 2, takenBy: by, axis: 'across' }),
];

describe('two sets of one bore', () => {
  it('stand side by side with their difference against the joint U', () => {
    const [second] = intakeOf({ readings: bodies('0.8425') }).secondSets;
    const [agreement] = second?.agreements ?? [];
    expect(agreement).toMatchObject({
      quantity: 'lifter-body-diameter',
      first: { text: '0.84240', unit: 'in' },
      second: { text: '0.84250', unit: 'in' },
      difference: { text: '0.00010', unit: 'in' },
      agree: true,
    });
    const joint = Number(agreement?.expandedUncertainty.text);
    const [first] = assessInspection(record({ readings: [body('b1', '0.8424')] })).facts.numbers;
    const u = (first?.standardUncertainty ?? 0) / 0.0254;
    expect(joint).toBeGreaterThanOrEqual(2 * Math.SQRT2 * u);
    expect(joint).toBeLessThan(2 * Math.SQRT2 * u + 0.00001);
  });

  it('that differ by more than that say so, and support no breach until a person chose', () => {
    const readings = bodies('0.8430');
    expect(intakeOf({ readings }).secondSets[0]?.agree).toBe(false);
    expect(atIntake('4.2', { readings }).pass).not.toBe(false);
    const stands = remark('c20', 'second-set', {
      place: intake,
      answer: { value: '2' },
      reason: 'The first was taken on the groove.',
    });
    expect(atIntake('4.2', { readings, remarks: [stands] })).toMatchObject({
      exact: inches('0.843'),
      pass: false,
    });
  });

  it('are pooled unless a person says which stands; the last word counts', () => {
    const readings = bodies('0.8425');
    expect(atIntake('4.2', { readings }).exact).toEqual(inches('0.84245'));
    const choice = (id: string, value: string) =>
      remark(id, 'second-set', { place: intake, answer: { value }, reason: 'by the class' });
    const with1 = { readings, remarks: [choice('c20', '1')] };
    expect(atIntake('4.2', with1).exact).toEqual(inches('0.8424'));
    expect(intakeOf(with1).choice).toEqual({
      stands: 1,
      reason: 'by the class',
      by: 'inspector',
    });
    const again = { readings, remarks: [choice('c20', '1'), choice('c21', 'pooled')] };
    expect(atIntake('4.2', again).exact).toEqual(inches('0.84245'));
  });

  it('by one person alone are a repeat, and recorded as such', () => {
    expect(intakeOf({ readings: bodies('0.8425') }).secondSets[0]?.alone).toBe(false);
    expect(intakeOf({ readings: bodies('0.8425', 'inspector') }).secondSets[0]).toMatchObject({
      alone: true,
      firstBy: ['inspector'],
      secondBy: ['inspector'],
    });
  });

  it('compare only what was read anew: a lifter taken over from the first set is no second reading', () => {
    const readings = [
      body('b1', '0.8424'),
      reading('r2', '0.8440'),
      reading('r13', '0.8441', { set: 2 }),
    ];
    const names = intakeOf({ readings }).secondSets[0]?.agreements.map(({ quantity }) => quantity);
    expect(names).toContain('tappet-bore-diameter');
    expect(names).toContain('tappet-clearance');
    expect(names).not.toContain('lifter-body-diameter');
  });
});

describe('a new zero', () => {
  const comparative = (id: string, set: number, zeroRunId: string) =>
    reading(id, '0.0001', { method: 'comparative', gaugeId: 'dial', set, zeroRunId });
  const first = comparative('r5', 1, 'run1');
  const zeros = [zero('z1', 'opening', '0'), zero('z8', 'closing', '0')];

  it.each([
    ['the first set’s own run', comparative('r10', 2, 'run1'), zeros, true],
    ['no zero at all', comparative('r10', 2, 'run2'), zeros, true],
    [
      'one opened before the first set was done',
      comparative('r10', 2, 'run2'),
      [...zeros, zero('z3', 'opening', '0', { runId: 'run2' })],
      true,
    ],
    [
      'one opened after it',
      comparative('r10', 2, 'run2'),
      [...zeros, zero('z9', 'opening', '0', { runId: 'run2' })],
      false,
    ],
    ['none, off a micrometer', body('b10', '0.8424', { set: 2 }), zeros, false],
  ])('a second set on %s', (_words, second, all, refused) => {
    expect(withoutNewZero([first, second], all).has(second.id)).toBe(refused);
  });
});
