import { describe, expect, it } from 'vitest';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import { isAllowed, largestDifference } from '@/domain/inspection/gauge/ring-check';
import { fromStored } from '@/domain/quantity/stored';
import { at, atIntake, body, inches, RULES, record } from './build';

const check = (second: number, difference: string) => ({
  id: `k${second}`,
  at: at(second),
  ring: 'RING',
  difference: inches(difference),
});

const old = (more: Partial<GaugeRecord>) =>
  record().gauges.map((row) => (row.id === 'old' ? { ...row, ...more } : row));

/** The class's rule, with what a check on the ring may be off. */
const allowing = (ringCheck: string | undefined) => ({
  ...RULES,
  clauses: RULES.clauses.map((clause) =>
    clause.requirement?.kind === 'limit' && ringCheck !== undefined
      ? { ...clause, requirement: { ...clause.requirement, ringCheck: inches(ringCheck) } }
      : clause,
  ),
});

const overdue = [body('r1', '0.8432', { gaugeId: 'old' })];

const found = (ringCheck: string | undefined, more: Partial<GaugeRecord>, readings = overdue) =>
  atIntake('4.2', { readings, rules: allowing(ringCheck), gauges: old(more) });

describe('a check on the ring', () => {
  it('differs by what was read less what was expected, exactly; the largest in size stands', () => {
    const readings = ['0.8441', '0.8438', '0.84405'].map(inches);
    const worst = largestDifference(readings, inches('0.8440'));
    expect([worst.text, worst.unit]).toEqual(['-0.0002', 'in']);
    const allowed = fromStored(inches('0.0002'), 'length');
    expect(isAllowed(worst, allowed)).toBe(true);
    expect(isAllowed(worst, fromStored(inches('0.00019'), 'length'))).toBe(false);
  });

  it.each<[string, string | undefined, Partial<GaugeRecord>, boolean | null]>([
    [
      'makes up for an overdue gauge where the class says so',
      '0.0001',
      { ringChecks: [check(60, '0.0001')] },
      false,
    ],
    ['counts whatever its sign', '0.0001', { ringChecks: [check(60, '-0.0001')] }, false],
    [
      'counts for nothing where the class says nothing',
      undefined,
      { ringChecks: [check(60, '0')] },
      null,
    ],
    [
      'off by more than the class allows makes up for nothing',
      '0.0001',
      { ringChecks: [check(60, '0.00011')] },
      null,
    ],
    ['is needed', '0.0001', {}, null],
    ['of another night counts for nothing', '0.0001', { ringChecks: [check(-43_261, '0')] }, null],
    ['before the reading counts as well', '0.0001', { ringChecks: [check(-43_199, '0')] }, false],
    [
      'the worst of several decides',
      '0.0001',
      { ringChecks: [check(60, '0'), check(90, '0.0003')] },
      null,
    ],
    [
      'makes up for no withdrawal',
      '0.0001',
      { ringChecks: [check(60, '0')], withdrawn: true },
      null,
    ],
    [
      'makes up for no missing calibration',
      '0.0001',
      { ringChecks: [check(60, '0')], calibratedOn: undefined },
      null,
    ],
    [
      'makes up for no gauge that was found bad',
      '0.0001',
      { ringChecks: [check(60, '0')], faults: [{ foundAt: at(600) }] },
      null,
    ],
  ])('%s', (_, ringCheck, more, pass) => {
    expect(found(ringCheck, more).pass).toBe(pass);
  });

  it('says why it made up for nothing, and when it was', () => {
    const { sentence, checked } = found('0.0001', { ringChecks: [check(60, '0.0003')] });
    expect(sentence).toMatch(
      /gauge OLD was overdue for calibration; gauge OLD checked on the ring RING at 21:01, off by 0.0003 in, 0.0001 in is allowed\.$/,
    );
    expect(checked).toEqual(['gauge OLD checked on the ring RING at 21:01, off by 0.0003 in']);
  });

  it('is told for a gauge in calibration too, and leaves what it says alone', () => {
    const gauges = record().gauges.map((row) =>
      row.id === 'mic' ? { ...row, ringChecks: [check(60, '0.0001')] } : row,
    );
    const readings = [body('r1', '0.8432')];
    const plain = atIntake('4.2', { readings });
    const { checked, ...rest } = atIntake('4.2', { readings, gauges });
    expect(rest).toEqual(plain);
    expect(checked).toEqual(['gauge MIC checked on the ring RING at 21:01, off by 0.0001 in']);
  });
});

describe('a gauge found bad', () => {
  const mic = (faults: GaugeRecord['faults'], withdrawn = true) =>
    record().gauges.map((row) => (row.id === 'mic' ? { ...row, faults, withdrawn } : row));
  const passOf = (gauges: readonly GaugeRecord[], second = 1) =>
    atIntake('4.2', { readings: [body(`r${second}`, '0.8432')], gauges }).pass;

  it('supports no breach by what it read after its last good check, or at all without one', () => {
    expect(passOf(mic([{ goodUntil: at(0), foundAt: at(60) }]))).toBeNull();
    expect(passOf(mic([{ foundAt: at(60) }]))).toBeNull();
    expect(passOf(mic([{ goodUntil: at(0), foundAt: at(60) }]), 90)).toBeNull();
  });

  it('keeps what it read before its last good check', () => {
    expect(passOf(mic([{ goodUntil: at(30), foundAt: at(60) }]))).toBe(false);
  });

  it('counts again once it is back in use', () => {
    expect(passOf(mic([{ goodUntil: at(0), foundAt: at(60) }], false), 90)).toBe(false);
    expect(passOf(mic([{ goodUntil: at(0), foundAt: at(60) }], false), 30)).toBeNull();
  });
});
