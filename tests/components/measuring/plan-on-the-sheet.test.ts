import { describe, expect, it } from 'vitest';
import { assessSheet } from '@/components/measuring/sheet/assess-sheet';
import { boreStates, checkStates } from '@/components/measuring/sheet/bore-states';
import { askedBy, leadsBy, partsAsked } from '@/components/measuring/sheet/flow/asked';
import { nextStep, type Standing } from '@/components/measuring/sheet/flow/steps';
import { questionOf } from '@/components/measuring/sheet/keys/question';
import { baseFor } from '@/components/measuring/sheet/keys/typed-base';
import { partsOf } from '@/components/measuring/sheet/parts';
import { gaugeFor, gaugesFor, usualSetUp } from '@/components/measuring/sheet/set-up';
import type { SheetGauge } from '@/components/measuring/sheet/sheet';
import { assessInspection, type InspectionRecord } from '@/domain/inspection/assess-inspection';
import { checkAsksOf } from '@/domain/inspection/plan/check-asks';
import { planOf } from '@/domain/inspection/plan/plan';
import { hideFirst } from '@/domain/inspection/second-set/hide-first';
import type { Clause } from '@/domain/rulebook/clause';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import {
  body,
  exhaust,
  GAUGES,
  intake,
  RULES,
  reading,
  record,
  remark,
  TWIN,
  zero,
} from '../../domain/inspection/build';

const inch = (text: string) => ({ text, unit: 'in' });
const named = GAUGES.map((gauge): SheetGauge => ({ ...gauge, name: gauge.code }));
const positions = positionsOf(TWIN);
const [first] = positions;
if (first === undefined) throw new Error('no bores');
const setUp = usualSetUp(named, '2026-07-16');

/** The sheet as it stands over the rows. */
const sheetOver = (more: Partial<InspectionRecord>, part = 'lifter-body-diameter') => {
  const whole = record(more);
  const assessment = assessInspection(whole);
  const plan = planOf(whole.rules, assessment, { advice: false });
  const parts = partsOf(whole.rules, setUp.form);
  const here = parts.find(({ key }) => key === part);
  if (here === undefined) throw new Error(`no part ${part}`);
  const standing: Standing = {
    part: here,
    parts: partsAsked(setUp, plan, parts),
    cursor: { bore: '1 intake', part, set: 1 },
    setUp,
    positions,
    position: positions.find(({ valve }) => valve === 'intake') ?? first,
    judged: assessment.judged,
    outOfReach: new Set(),
    asked: askedBy(setUp, plan),
    leads: leadsBy(setUp, plan),
    second: [],
  };
  return { standing, assessment, plan, parts, part: here };
};

describe('the sheet follows the plan', () => {
  it('goes on after one clear reading, and stays where one is near a limit', () => {
    const clear = sheetOver({ readings: [body('b1', '0.8421', { depth: 'upper' })] });
    expect(nextStep(clear.standing)).toMatchObject({ kind: 'bore' });
    const near = sheetOver({ readings: [body('b1', '0.8426', { depth: 'upper' })] });
    expect(nextStep(near.standing)).toEqual({ kind: 'cell', cell: 'upper/across' });
  });

  it('leads from part to part, and never into what only advice asks', () => {
    const readings = [
      body('b1', '0.8421', { depth: 'upper' }),
      body('b2', '0.8421', { depth: 'upper', place: exhaust }),
    ];
    const { standing } = sheetOver({ readings });
    expect(nextStep(standing)).toMatchObject({
      kind: 'part',
      part: { key: 'foot-diameter' },
    });
    expect(standing.parts.map(({ key }) => key)).not.toContain('tappet-bore-diameter');
  });

  it('leads through a sample and no further', () => {
    const clauses = RULES.clauses.flatMap((clause): readonly Clause[] =>
      clause.number === '4.2' && clause.requirement?.kind === 'limit'
        ? [
            {
              ...clause,
              requirement: { ...clause.requirement, sample: { kind: 'some', count: 1 } },
            },
          ]
        : [],
    );
    const rules = { ...RULES, clauses };
    const readings = [body('b1', '0.8421', { depth: 'upper' })];
    expect(nextStep(sheetOver({ rules, readings }).standing)).toEqual({ kind: 'done' });
    const { standing } = sheetOver({ rules, readings });
    const everywhere = { ...standing, leads: leadsBy({ form: 'screening' }, []) };
    expect(nextStep(everywhere)).toMatchObject({ kind: 'bore' });
  });

  it('shows no result while the set is not complete', () => {
    const seen = (readings: InspectionRecord['readings']) => {
      const { standing, assessment, parts, part } = sheetOver({ readings });
      return boreStates({ ...standing, assessment, parts, part }).bores['1 intake'];
    };
    const one = body('b1', '0.8440', { depth: 'upper' });
    expect(
      assessInspection(record({ readings: [one] })).findings.find(({ clause }) => clause === '4.2')
        ?.perPosition[0]?.state,
    ).toBe('outside');
    expect(seen([one])).toEqual({ status: 'not-measured' });
    const full = [
      one,
      body('b2', '0.8440', { depth: 'upper', axis: 'across' }),
      body('b3', '0.8440', { depth: 'lower' }),
      body('b4', '0.8440', { depth: 'lower', axis: 'across' }),
    ];
    expect(seen(full)?.status).toBe('outside');
  });

  it('marks no bore within by its checks alone', () => {
    const answered = (value: string) => {
      const remarks = [
        remark('c1', 'check', { subject: 'bore-bushed', place: intake, answer: { value } }),
      ];
      const assessment = assessInspection(record({ remarks }));
      const checks = checkAsksOf(RULES, assessment.facts);
      return checkStates(positions, checks, assessment, new Set()).bores['1 intake'];
    };
    expect(answered('no')).toEqual({ status: 'not-measured', value: '1/1' });
    expect(answered('yes')).toEqual({ status: 'outside', value: '1/1' });
  });
});

describe('after a closing zero', () => {
  it('nothing goes on before what came of it was seen', () => {
    const { standing } = sheetOver({}, 'tappet-bore-diameter');
    const closed = { ...standing, cursor: { ...standing.cursor, closed: 'run1' } };
    expect(nextStep(closed)).toEqual({ kind: 'closed', runId: 'run1' });
  });

  it('a zero that moved names the bores of its run and their readings', () => {
    const readings = [
      reading('r2', '0.0001', { method: 'comparative', gaugeId: 'dial', zeroRunId: 'run1' }),
    ];
    const run = (closing: string, remarks: InspectionRecord['remarks'] = []) =>
      assessInspection(
        record({
          readings,
          remarks,
          zeros: [zero('z1', 'opening', '0'), zero('z3', 'closing', closing)],
        }),
      ).runs[0];
    // A quarter of the window of 0.0006 in is 0.00015 in.
    expect(run('0.0001')).toMatchObject({ held: true, bores: ['1 intake'] });
    expect(run('0.0002')).toMatchObject({ held: false, bores: ['1 intake'] });
    const struck = [remark('s4', 'strike', { readingId: 'r2', reason: 'zero-moved' })];
    expect(run('0.0002', struck)).toMatchObject({ held: false, bores: [] });
  });
});

describe('a hidden first set', () => {
  it('leaves neither its numbers nor what is worked out from them, moved ones included', () => {
    const astray = body('b3', '0.8433', { place: exhaust });
    const rows = {
      readings: [body('b1', '0.8426'), astray, body('b9', '0.8425', { set: 2 })],
      zeros: [],
      remarks: [remark('m4', 'move', { readingId: 'b3', place: intake })],
    };
    const left = hideFirst(rows, { bores: ['1 intake'], set: 2 });
    expect(left.readings.map(({ id }) => id)).toEqual(['b9']);
    const { facts } = assessInspection(assessSheetRecord(left));
    expect(
      JSON.stringify(facts.numbers, (_key, value) =>
        typeof value === 'bigint' ? String(value) : value,
      ),
    ).not.toContain('0.8426');
  });
});

const assessSheetRecord = (rows: Pick<InspectionRecord, 'readings' | 'zeros' | 'remarks'>) =>
  record(rows);

describe('a gauge for each quantity', () => {
  const inside: SheetGauge = {
    id: 'in-26',
    code: 'IM-02',
    name: 'Inside micrometer',
    kind: 'micrometer',
    division: inch('0.0005'),
    range: { from: inch('2'), to: inch('6') },
    calibratedOn: '2026-03-02',
    dueOn: '2027-03-02',
  };
  const depth: SheetGauge = {
    ...inside,
    id: 'in-01',
    code: 'MC-01',
    range: { from: inch('0'), to: inch('1') },
  };
  const scale: SheetGauge = {
    ...inside,
    id: 'sc-1',
    code: 'SC-1',
    kind: 'scale',
    division: { text: '0.1', unit: 'g' },
    range: undefined,
  };
  const all = [inside, depth, scale];
  const usual = usualSetUp(all, '2026-07-16');

  it('is the one that reaches it, until another is chosen for it alone', () => {
    expect(gaugeFor(usual, 'cylinder-bore', all)?.code).toBe('IM-02');
    expect(gaugeFor(usual, 'valve-lift', all)?.code).toBe('MC-01');
    expect(gaugeFor(usual, 'lifter-weight', all)?.code).toBe('SC-1');
    const chosen = { ...usual, gaugeIds: { 'valve-lift': 'in-26' } };
    expect(gaugeFor(chosen, 'valve-lift', all)?.code).toBe('IM-02');
    expect(gaugeFor(chosen, 'cylinder-bore', all)?.code).toBe('IM-02');
    expect(gaugesFor('stroke', all).map(({ code }) => code)).toEqual(['IM-02', 'MC-01']);
  });

  it('reads what its division is of: no length off a burette, no volume off a micrometer', () => {
    const burette: SheetGauge = {
      ...inside,
      id: 'bu-1',
      code: 'AB-1',
      kind: 'other',
      division: { text: '0.1', unit: 'cc' },
      range: undefined,
    };
    const more = [burette, ...all];
    const set = usualSetUp(more, '2026-07-16');
    expect(gaugeFor(set, 'cylinder-bore', more)?.code).toBe('IM-02');
    expect(gaugeFor(set, 'gasket-thickness', more)?.code).toBe('MC-01');
    expect(gaugesFor('chamber-volume', more).map(({ code }) => code)).toEqual(['AB-1']);
  });

  it('is asked about when it does not reach what was read off it', () => {
    const read = { value: '1.8740', unit: 'in', comparative: false, quantity: 'stroke' } as const;
    expect(questionOf(read, depth)).toContain('out of the range of MC-01, 0 to 1 in');
    expect(questionOf({ ...read, value: '3.4800' }, inside)).toBeUndefined();
  });
});

describe('parts of a reference set', () => {
  it('are read first, as many as the clause counts', () => {
    const clause: Clause = {
      number: '9.1',
      heading: 'Valve head',
      words: 'As the average of at least three reference parts.',
      force: 'mandatory',
      requirement: {
        kind: 'reference-average',
        quantity: 'valve-head-diameter',
        unit: 'in',
        per: 'bore',
        n: 3,
        plus: inch('0.005'),
        minus: inch('0.005'),
        decisionRule: { kind: 'simple' },
        comparison: { method: 'absolute' },
      },
    } as Clause;
    const parts = partsOf({ clauses: [clause] }, 'plan');
    expect(parts.map(({ key, per }) => `${key} ${per}`)).toEqual([
      'valve-head-diameter bore',
      'reference valve-head-diameter engine',
    ]);
    const [, reference] = parts;
    if (reference === undefined) throw new Error('no reference parts');
    expect(askedBy(setUp, [])(reference, first)).toEqual(
      ['R1', 'R2', 'R3'].map((depth) => ({ depth, axis: '' })),
    );
  });
});

it('a nominal size completes two digits, as the gauge resolves it', () => {
  const scale = { unit: 'in', shown: 'in', decimals: 4 };
  expect(baseFor(RULES, 'lifter-body-diameter', scale)).toBe('0.8420');
  expect(baseFor(RULES, 'foot-diameter', scale)).toBe('0.8420');
  expect(baseFor(RULES, 'tappet-bore-diameter', scale)).toBeUndefined();
  expect(baseFor({ clauses: [] }, 'lifter-body-diameter', scale)).toBeUndefined();
});

it('a reading of this device counts before it has gone round', () => {
  const rows = { readings: [], zeros: [], remarks: [] };
  const row = { ...body('b1', '0.8421'), kind: 'reading' as const, temperatures: undefined };
  const then = assessSheet.withReading(rows, row as Parameters<typeof assessSheet.counting>[0]);
  expect(assessSheet.judge(then).judged.map(({ state }) => state)).toEqual(['counts']);
});
