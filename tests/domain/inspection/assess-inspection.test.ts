import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import type { ReadingRow } from '@/domain/inspection/capture/rows';
import { neededPerBore } from '@/domain/inspection/completeness';
import { declaredAgainstFound } from '@/domain/inspection/declared-against-found';
import { positionsIn } from '@/domain/inspection/found-facts';
import { secondSetsWanted } from '@/domain/inspection/second-set/wanted';
import { facts, number } from '../rulebook/build';
import {
  atIntake,
  body,
  exhaust,
  findingOf,
  foot,
  inches,
  intake,
  RULES,
  reading,
  record,
  remark,
  TWIN,
  zero,
} from './build';

/** Readings off a dial that reads minus for a larger bore, zeroed on this lifter. */
const dial = (id: string, text: string, more: Partial<ReadingRow> = {}) =>
  reading(id, text, { method: 'comparative', gaugeId: 'dial', zeroRunId: 'run1', ...more });

const bodies = [body('r1', '0.8423'), body('r2', '0.8423', { axis: 'across' })];

describe('clearance', () => {
  // Mean bore 0.8440, lifter 0.8423: 0.0017 in, good for a flat tappet (common practice).
  const absolute = [
    ...bodies,
    reading('r3', '0.8440'),
    reading('r4', '0.8440', { axis: 'across' }),
  ];

  it('by the absolute method is bore less lifter, exactly', () => {
    const found = atIntake('4.6', { readings: absolute });
    expect(found).toMatchObject({
      state: 'within',
      value: { text: '0.0017', unit: 'in' },
      exact: { text: '0.0017' },
    });
  });

  it('averages true repeats at one place of the lifter, so that no place weighs more than another', () => {
    const readings = [
      body('r1', '0.8424'),
      body('r2', '0.8424', { repeat: 2 }),
      body('r5', '0.8424', { repeat: 3 }),
      body('r6', '0.8422', { axis: 'across' }),
      ...absolute.slice(2),
    ];
    expect(atIntake('4.6', { readings }).exact?.text).toBe('0.0017');
  });

  it('by the comparative method is the reading itself, sign and drift taken out', () => {
    const readings = [
      ...bodies,
      dial('r11', '-0.0017'),
      dial('r12', '-0.0017', { axis: 'across' }),
    ];
    const still = [zero('z10', 'opening', '0.0000'), zero('z13', 'closing', '0.0000')];
    expect(atIntake('4.6', { readings, zeros: still }).exact?.text).toBe('0.0017');
    // Drift of 0.00006 in over two readings: 0.00002 and 0.00004 go off before the sign.
    const drifted = [zero('z10', 'opening', '0.0000'), zero('z13', 'closing', '0.00006')];
    expect(atIntake('4.6', { readings, zeros: drifted }).exact?.text).toBe('0.00173');
  });

  it('on a setting ring takes the ring’s size', () => {
    const readings = [...bodies, dial('r11', '-0.0005')];
    const zeros = [
      zero('z10', 'opening', '0', { zeroedOn: 'ring', ringId: 'ring', size: inches('0.8435') }),
    ];
    expect(atIntake('4.6', { readings, zeros }).exact?.text).toBe('0.0017');
  });

  it('counts a struck reading as a turn in its run, not as a value', () => {
    const readings = [...bodies, dial('r11', '-0.0090'), dial('r12', '-0.0017')];
    const zeros = [zero('z10', 'opening', '0'), zero('z13', 'closing', '0.00006')];
    const remarks = [remark('s20', 'strike', { readingId: 'r11', reason: 'gauge-slipped' })];
    expect(atIntake('4.6', { readings, zeros, remarks }).exact?.text).toBe('0.00174');
  });

  it('says what its U is made of, the largest first', () => {
    const { budget = [] } = atIntake('4.6', { readings: absolute });
    const shares = budget.map(({ share }) => Number(share));
    expect(shares).toEqual([...shares].sort((a, b) => b - a));
    expect(budget.map(({ words }) => words).join(' ')).toMatch(
      /^The hand’s repeatability is half of it\. The micrometer’s division/,
    );
    expect(budget.every(({ words, share }) => words !== '' && /^\d+$/.test(share))).toBe(true);
  });

  it('out of the advisory window warns and fails nobody', () => {
    const readings = [...bodies, reading('r3', '0.8446')];
    const found = findingOf('4.6', { readings });
    expect(found).toMatchObject({ advisory: true, pass: null, state: 'outside' });
    expect(found.cautions[0]).toMatch(/loose flat tappet/);
    expect(found.readings).toEqual(['r1', 'r2', 'r3']);
    expect(found.gauges).toEqual(['mic', 'bore']);
  });

  it('stands at the bore to which its readings were moved', () => {
    const wrong = absolute.map((row) => ({ ...row, place: exhaust }));
    const remarks = wrong.map((row, i) =>
      remark(`m${50 + i}`, 'move', { readingId: row.id, place: intake }),
    );
    const before = findingOf('4.6', { readings: wrong }).perPosition.map((row) => row.state);
    const after = findingOf('4.6', { readings: wrong, remarks }).perPosition.map(
      (row) => row.state,
    );
    expect([before, after]).toEqual([
      ['not-measured', 'within'],
      ['within', 'not-measured'],
    ]);
  });

  it('is taken to 20 °C where temperatures were logged', () => {
    const temperatures = {
      bore: { text: '60', unit: '°C' },
      lifter: { text: '20', unit: '°C' },
    };
    const readings = [body('r1', '0.8423'), reading('r3', '0.8444', { temperatures })];
    const found = atIntake('4.6', { readings });
    // A block 40 °C hot is 0.0004 in large (common practice): 0.0021 in is 0.0017 in when cold.
    expect(Number(found.exact?.text)).toBeGreaterThan(0.00169);
    expect(Number(found.exact?.text)).toBeLessThan(0.00173);
  });
});

describe('a run whose closing zero failed', () => {
  const zeros = [zero('z10', 'opening', '0'), zero('z13', 'closing', '0.0005')];
  const first = [...bodies, dial('r11', '-0.0016'), dial('r12', '-0.0016', { axis: 'across' })];

  it('names its bores and erases nothing', () => {
    const result = assessInspection(record({ readings: first, zeros }));
    expect(result.redo).toEqual([{ bank: 'block', cylinder: 1, valve: 'intake' }]);
    expect(result.judged.filter((row) => row.state === 'counts')).toHaveLength(4);
    expect(result.bores[0]?.sets[0]?.measurement.redo).toBe(true);
  });

  it('gives way to the run that took its place', () => {
    const again = [
      dial('r31', '-0.0018', { zeroRunId: 'run2' }),
      dial('r32', '-0.0018', { axis: 'across', zeroRunId: 'run2' }),
    ];
    const good = [
      zero('z30', 'opening', '0', { runId: 'run2' }),
      zero('z33', 'closing', '0', { runId: 'run2' }),
    ];
    const result = assessInspection(
      record({ readings: [...first, ...again], zeros: [...zeros, ...good] }),
    );
    const [set] = result.bores[0]?.sets ?? [];
    expect(result.redo).toEqual([]);
    expect(set?.measurement.clearance?.mean.text).toBe('0.0018');
    expect(set?.set.superseded.map(({ row }) => row.id)).toEqual(['r11', 'r12']);
  });

  it('of two runs that held the later counts', () => {
    const held = [zero('z10', 'opening', '0'), zero('z13', 'closing', '0')];
    const again = [dial('r31', '-0.0018', { zeroRunId: 'run2' })];
    const good = [
      zero('z30', 'opening', '0', { runId: 'run2' }),
      zero('z33', 'closing', '0', { runId: 'run2' }),
    ];
    const result = assessInspection(
      record({ readings: [...first, ...again], zeros: [...held, ...good] }),
    );
    expect(result.bores[0]?.sets[0]?.measurement.clearance?.mean.text).toBe('0.0018');
  });

  it('is not replaced by a later run that failed too', () => {
    const good = [zero('z13', 'closing', '0'), zero('z10', 'opening', '0')];
    const again = [dial('r31', '-0.0018', { zeroRunId: 'run2' })];
    const bad = [
      zero('z30', 'opening', '0', { runId: 'run2' }),
      zero('z33', 'closing', '0.0009', { runId: 'run2' }),
    ];
    const result = assessInspection(
      record({ readings: [...first, ...again], zeros: [...good, ...bad] }),
    );
    expect(result.bores[0]?.sets[0]?.measurement.clearance?.mean.text).toBe('0.0016');
  });
});

describe('the lifter', () => {
  it('with a foot larger than allowed fails its mandatory clause', () => {
    const readings = [body('r1', '0.8423'), foot('r2', '0.8448')];
    const found = findingOf('4.3', { readings });
    expect(found).toMatchObject({ pass: false, state: 'outside', advisory: false, fit: true });
    expect(found.perPosition.find((row) => row.position === '1 intake')?.exact?.text).toBe(
      '0.0025',
    );
  });

  it('near its limit is too close to call, and the competitor has the doubt', () => {
    expect(
      atIntake('4.2', { readings: [body('r1', '0.8426'), body('r2', '0.8427')] }),
    ).toMatchObject({
      state: 'too-close',
      pass: true,
    });
    expect(atIntake('4.2', { readings: [body('r1', '0.8423')] })).toMatchObject({
      state: 'within',
      pass: true,
    });
    expect(atIntake('4.2', { readings: [body('r1', '0.8432')] })).toMatchObject({
      state: 'outside',
      pass: false,
    });
  });

  it('measured with a gauge overdue on that local day supports no breach', () => {
    // Due on 14 July; it is the 15th at the track, though the 16th in UTC.
    const readings = [body('r1', '0.8432', { gaugeId: 'old' })];
    const found = atIntake('4.2', { readings });
    expect(found).toMatchObject({ state: 'no-statement', pass: null });
    expect(found.sentence).toMatch(/gauge OLD was overdue/);
    const due = record().gauges.map((row) =>
      row.id === 'old' ? { ...row, dueOn: '2026-07-15' } : row,
    );
    expect(atIntake('4.2', { readings, gauges: due }).pass).toBe(false);
  });

  it('measured out of the gauge’s range, or with an unknown gauge, supports no breach', () => {
    const out = atIntake('4.2', { readings: [body('r1', '1.0432')] });
    expect(out).toMatchObject({ state: 'no-statement', pass: null });
    expect(out.sentence).toMatch(/out of the range of gauge MIC/);
    const unknown = atIntake('4.2', { readings: [body('r1', '0.8432', { gaugeId: 'lost' })] });
    expect(unknown.sentence).toMatch(/not in the register/);
  });
});

describe('a ring overdue for calibration', () => {
  it('supports no breach of what was zeroed on it', () => {
    const rules = {
      ...RULES,
      clauses: RULES.clauses.map((row) =>
        row.number === '4.6' ? { ...row, force: 'mandatory' as const } : row,
      ),
    };
    const readings = [...bodies, dial('r11', '-0.0015')];
    const zeroed = (ringId: string) => [
      zero('z10', 'opening', '0', { zeroedOn: 'ring', ringId, size: inches('0.8435') }),
    ];
    expect(atIntake('4.6', { readings, rules, zeros: zeroed('ring') }).pass).toBe(false);
    const old = atIntake('4.6', { readings, rules, zeros: zeroed('old') });
    expect(old).toMatchObject({ state: 'no-statement', pass: null });
  });
});

describe('an independent second set', () => {
  it('is wanted where a mandatory number is too close to call, until there is one', () => {
    const near = [
      body('r1', '0.8426'),
      body('r2', '0.8427'),
      body('r3', '0.8423', { place: exhaust }),
    ];
    expect(secondSetsWanted(assessInspection(record({ readings: near })))).toEqual([
      { bore: '1 intake', set: 2 },
    ]);
    const second = [...near, body('r4', '0.8426', { set: 2 }), body('r5', '0.8427', { set: 2 })];
    expect(secondSetsWanted(assessInspection(record({ readings: second })))).toEqual([]);
    const advisory = [...bodies, reading('r3', '0.8442')];
    expect(atIntake('4.6', { readings: advisory }).state).toBe('too-close');
    expect(secondSetsWanted(assessInspection(record({ readings: advisory })))).toEqual([]);
  });

  const set = (n: number, text: string, id: string) => [
    body(`r${id}1`, '0.8423', { set: n }),
    reading(`r${id}2`, text, { set: n }),
  ];

  it('that agrees is joined with the first by their mean', () => {
    const readings = [...set(1, '0.8443', '1'), ...set(2, '0.8442', '2')];
    expect(atIntake('4.6', { readings }).exact?.text).toBe('0.00195');
    expect(assessInspection(record({ readings })).bores[0]?.sets).toHaveLength(2);
  });

  it('that disagrees supports no breach', () => {
    const rules = {
      ...RULES,
      clauses: RULES.clauses.map((row) =>
        row.number === '4.6' ? { ...row, force: 'mandatory' as const } : row,
      ),
    };
    const readings = [...set(1, '0.8450', '1'), ...set(2, '0.8443', '2')];
    const found = atIntake('4.6', { readings, rules });
    expect(found).toMatchObject({ state: 'no-statement', pass: null });
    expect(found.sentence).toMatch(/two independent sets/);
    expect(
      atIntake('4.6', { readings: [...set(1, '0.8450', '1'), ...set(2, '0.8450', '2')], rules })
        .pass,
    ).toBe(false);
  });
});

describe('checks', () => {
  const check = (id: string, subject: string, value: string, more = {}) =>
    remark(id, 'check', { subject, answer: { value }, ...more });

  it('count with their last answer', () => {
    const remarks = [check('c2', 'tappet-type', 'flat'), check('c1', 'tappet-type', 'roller')];
    expect(findingOf('4.1', { remarks })).toMatchObject({ pass: true, checks: ['c1', 'c2'] });
  });

  it('at one bore fail that bore', () => {
    const remarks = [
      check('c1', 'bore-bushed', 'no'),
      check('c2', 'bore-bushed', 'yes', { place: exhaust }),
    ];
    const found = findingOf('4.4', { remarks });
    expect(found.pass).toBe(false);
    expect(found.perPosition.map((row) => row.pass)).toEqual([true, false]);
  });

  it('against the paperwork find what differs', () => {
    const paperwork = facts({
      origin: 'declared',
      answers: [{ subject: 'block-casting-number', position: 'engine', answer: '3012' }],
    });
    const remarks = [check('c1', 'block-casting-number', '3013')];
    expect(findingOf('3.2', { remarks, paperwork })).toMatchObject({
      state: 'does-not-comply',
      pass: false,
    });
  });
});

describe('declared against found', () => {
  it('marks what differs by more than the uncertainty, and breaches nothing', () => {
    const paperwork = facts({
      origin: 'declared',
      positions: positionsIn(TWIN),
      numbers: [
        number('lifter-body-diameter', '1 intake', '0.84235'),
        number('lifter-body-diameter', '1 exhaust', '0.8410'),
        number('displacement', 'engine', '355'),
      ],
    });
    const readings = [body('r1', '0.8423'), body('r2', '0.8423', { place: exhaust })];
    const assessed = assessInspection(record({ readings, paperwork }));
    expect(
      declaredAgainstFound(assessed.facts).map((row) => [
        row.position,
        row.declared.text,
        row.found.text,
        row.differs,
      ]),
    ).toEqual([
      ['1 intake', '0.84235', '0.8423', false],
      ['1 exhaust', '0.8410', '0.8423', true],
    ]);
    expect(assessed.findings.find((row) => row.clause === '4.2')?.pass).toBe(true);
    expect(declaredAgainstFound(assessInspection(record({ readings })).facts)).toEqual([]);
  });
});

describe('completeness', () => {
  it('follows the mandatory clauses', () => {
    expect(neededPerBore(RULES)).toEqual(['lifter-body-diameter', 'foot-diameter']);
    const readings = [
      body('r1', '0.8423'),
      foot('r2', '0.8420'),
      body('r3', '0.8423', { place: exhaust }),
    ];
    expect(assessInspection(record({ readings })).completeness).toMatchObject({
      complete: false,
      measured: 1,
      expected: 2,
      missing: [{ valve: 'exhaust' }],
    });
  });

  it('tells a bore out of reach from one not measured, and names a bore this engine has not', () => {
    const readings = [
      body('r1', '0.8423'),
      foot('r2', '0.8420'),
      body('r3', '0.8423', { place: { bank: 'block', cylinder: '9', valve: 'intake' } }),
    ];
    const remarks = [remark('n4', 'not-reached', { place: exhaust, reason: 'broken bolt' })];
    const result = assessInspection(record({ readings, remarks }));
    expect(result.completeness).toMatchObject({ complete: true, measured: 1, missing: [] });
    expect(result.completeness.unknown).toMatchObject([{ cylinder: 9, valve: 'intake' }]);
    const body2 = result.findings.find((row) => row.clause === '4.2');
    expect(body2?.perPosition.map((row) => row.state)).toEqual(['within', 'could-not-be-reached']);
  });
});

describe('the engine', () => {
  it('has its displacement from bores and stroke', () => {
    const place = { bank: 'block', cylinder: '1', valve: '' } as const;
    const readings = [
      reading('r1', '4.0000', { quantity: 'cylinder-bore', place }),
      reading('r2', '3.500', { quantity: 'stroke', place: { bank: '', cylinder: '', valve: '' } }),
    ];
    const found = findingOf('3.1', { readings });
    // π/4 × 4² × 3.5 = 43.98 in³.
    expect(found.perPosition[0]?.value?.text).toMatch(/^43\.98/);
    expect(found.readings).toEqual(['r1', 'r2']);
  });
});

describe('the assessment', () => {
  const all: InspectionRecord = record({
    readings: [
      ...bodies,
      foot('r5', '0.8424'),
      dial('r11', '-0.0017'),
      dial('r12', '-0.0018', { axis: 'across' }),
      dial('r13', '-0.0018', { axis: 'across', repeat: 2 }),
      dial('r14', '-0.0040', { depth: 'below' }),
      body('r21', '0.8422', { place: exhaust }),
      reading('r22', '0.8441', { place: exhaust, standing: 'received' }),
    ],
    zeros: [zero('z10', 'opening', '0'), zero('z19', 'closing', '0.0001')],
    remarks: [
      remark('s30', 'strike', { readingId: 'r14', reason: 'sign-lost' }),
      remark('c31', 'check', { subject: 'tappet-type', answer: { value: 'flat' } }),
      remark('n32', 'not-reached', { place: exhaust, subject: 'tappet-bore-diameter' }),
    ],
  });

  it('is the same whatever order the rows arrive in: tablet and server agree', () => {
    const expected = JSON.stringify(assessInspection(all).findings);
    fc.assert(
      fc.property(
        fc.shuffledSubarray([...all.readings], { minLength: all.readings.length }),
        fc.shuffledSubarray([...all.zeros], { minLength: all.zeros.length }),
        fc.shuffledSubarray([...all.remarks], { minLength: all.remarks.length }),
        (readings, zeros, remarks) => {
          expect(
            JSON.stringify(assessInspection({ ...all, readings, zeros, remarks }).findings),
          ).toBe(expected);
        },
      ),
      { numRuns: 40 },
    );
  });

  it('of nothing is a finding per clause and no statement', () => {
    const { findings, completeness } = assessInspection(record());
    expect(findings.map((row) => row.clause)).toEqual([
      '3.1',
      '3.2',
      '4.1',
      '4.2',
      '4.3',
      '4.4',
      '4.5',
      '4.6',
      '5.1',
      '5.2',
      '6',
    ]);
    expect(findings.every((row) => row.pass === null)).toBe(true);
    expect(completeness.measured).toBe(0);
  });

  it('makes a bore out of reach open for what needs its readings only', () => {
    const found = assessInspection(all).findings;
    const stateAt = (clause: string) =>
      found
        .find((row) => row.clause === clause)
        ?.perPosition.find((row) => row.position === '1 exhaust')?.state;
    expect([stateAt('4.6'), stateAt('4.2'), stateAt('4.3')]).toEqual([
      'could-not-be-reached',
      'within',
      'not-measured',
    ]);
  });

  it('never fails a clause on an advisory number', () => {
    fc.assert(
      fc.property(fc.integer({ min: 8423, max: 8490 }), (tenths) => {
        const readings = [...bodies, reading('r3', `0.${tenths}`)];
        expect(findingOf('4.6', { readings }).pass).not.toBe(false);
      }),
    );
  });
});
