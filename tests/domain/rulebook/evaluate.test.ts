import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { State } from '@/domain/rulebook/clause-result';
import { evaluateClause } from '@/domain/rulebook/evaluate/evaluate-clause';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { Facts } from '@/domain/rulebook/evaluate/facts';
import type { LimitRequirement } from '@/domain/rulebook/limit';
import type { Requirement } from '@/domain/rulebook/requirement';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import type { Waiver } from '@/domain/rulebook/ruling';
import { bores, clause, clearance, facts, lift, number, quantity, TENTH } from './build';

const one = (bore: string) =>
  facts({
    positions: { bores: bores('1I'), cylinders: [] },
    numbers: [
      number('tappet-clearance', '1I', bore, { figure: 'mean', standardUncertainty: 0.3 * TENTH }),
    ],
  });
const foot = limit({
  quantity: 'foot-less-body',
  unit: 'in',
  per: 'lifter',
  max: inches('0.0010'),
});
const oneFoot = (text: string, u = 0.5) =>
  facts({
    positions: { bores: bores('1I'), cylinders: [] },
    numbers: [number('foot-less-body', '1I', text, { standardUncertainty: u * TENTH })],
  });

describe('a limit', () => {
  // The trade's figures for flat tappets, 0.0013 to 0.0019 in: common practice. U = 0.00006 in here.
  it.each<[string, State, boolean | null]>([
    ['0.0012', 'outside', false],
    ['0.00125', 'too-close', false],
    ['0.00126', 'too-close', true],
    ['0.0013', 'too-close', true],
    ['0.0016', 'within', true],
    ['0.0019', 'too-close', true],
    ['0.0020', 'outside', false],
  ])('mandatory: %s in is %s', (text, state, pass) => {
    const result = evaluateClause(clause(clearance()), one(text));
    expect([result.state, result.pass, result.fit]).toEqual([state, pass, true]);
  });

  it.each<[string, State, boolean | null]>([
    ['0.0012', 'outside', null],
    ['0.0016', 'within', true],
    ['0.0020', 'outside', null],
  ])('advisory: %s in is %s and fails nobody', (text, state, pass) => {
    const result = evaluateClause(clause(clearance(), { force: 'advisory' }), one(text));
    expect([result.state, result.pass, result.perPosition[0]?.pass]).toEqual([state, pass, pass]);
    expect(result.sentence.includes('disqualifies nobody')).toBe(state === 'outside');
  });

  it.each([
    ['0.0020', 'flat', /loose flat tappet/],
    ['0.0020', undefined, /loose flat tappet/],
    ['0.0020', 'roller', /loose lifter/],
    ['0.0012', 'flat', /tight lifter/],
  ])('of clearance at %s in on %s says what can happen', (text, type, caution) => {
    const found: Facts = {
      ...one(text),
      answers:
        type === undefined ? [] : [{ subject: 'tappet-type', position: 'engine', answer: type }],
    };
    const { cautions } = evaluateClause(clause(clearance(), { force: 'advisory' }), found);
    expect(cautions).toHaveLength(1);
    expect(cautions[0]).toMatch(caution);
    expect(cautions[0]).toMatch(/own specification governs/);
  });

  it('within gives no caution', () => {
    expect(evaluateClause(clause(clearance()), one('0.0016')).cautions).toEqual([]);
  });

  it('names position, figure, number, uncertainty and limit, and states its rule', () => {
    const [row] = evaluateClause(clause(clearance()), one('0.0020')).perPosition;
    expect(row?.sentence).toBe(
      'Bore 1I: mean 0.0020 in ± 0.00006 in; at least 0.0013 in and at most 0.0019 in: outside.',
    );
    expect(row?.rule).toMatch(/breaches this clause only when/);
    expect(row?.uncertainty).toEqual({ text: '0.00006', unit: 'in' });
  });

  it('with an unfit gauge makes no statement', () => {
    // A snap gauge that can be off by 0.001 in against a window of 0.0006 in: common practice.
    const found = {
      ...one('0.0030'),
      numbers: [
        number('tappet-clearance', '1I', '0.0030', {
          figure: 'mean',
          standardUncertainty: 5 * TENTH,
        }),
      ],
    };
    const result = evaluateClause(clause(clearance()), found);
    expect([result.state, result.pass, result.fit]).toEqual(['no-statement', null, false]);
    expect(result.sentence).toMatch(/gauge is not fit for this rule/);
  });

  it('is not breached by a reading that cannot support a breach, but can be met by it', () => {
    const overdue = { cannotSupportBreach: 'the gauge was overdue for calibration' };
    const fact = (text: string) =>
      facts({
        positions: { bores: bores('1I'), cylinders: [] },
        numbers: [
          number('foot-less-body', '1I', text, { ...overdue, standardUncertainty: 0.3 * TENTH }),
        ],
      });
    const breach = evaluateClause(clause(foot), fact('0.0014'));
    expect([breach.state, breach.pass]).toEqual(['no-statement', null]);
    expect(breach.sentence).toMatch(/overdue/);
    expect(evaluateClause(clause(foot), fact('0.0002')).pass).toBe(true);
  });

  it.each<[string, number, LimitRequirement['decisionRule'], State, boolean | null]>([
    ['0.00105', 0.5, { kind: 'simple' }, 'too-close', false],
    ['0.00105', 0.5, { kind: 'guarded-rejection' }, 'too-close', true],
    ['0.00095', 0.5, { kind: 'guarded-acceptance' }, 'too-close', false],
    ['0.00105', 0.5, { kind: 'iso14253' }, 'too-close', null],
    ['0.0014', 0.5, { kind: 'guarded-rejection' }, 'outside', false],
  ])('foot %s in over, u %d tenths, by rule %j', (text, u, decisionRule, state, pass) => {
    const result = evaluateClause(clause({ ...foot, decisionRule }), oneFoot(text, u));
    expect([result.state, result.pass]).toEqual([state, pass]);
  });

  it.each([
    [
      'limit rounded up helps',
      { of: 'limit', direction: 'up', step: inches('0.01') },
      '0.0080',
      true,
    ],
    [
      'measured value rounded up hurts',
      { of: 'measured', direction: 'up', step: inches('0.01') },
      '0.0005',
      false,
    ],
    [
      'measured value rounded down helps',
      { of: 'measured', direction: 'down', step: inches('0.01') },
      '0.0080',
      true,
    ],
  ] as const)('%s', (_, rounding, text, pass) => {
    expect(evaluateClause(clause({ ...foot, rounding }), oneFoot(text, 0)).pass).toBe(pass);
  });

  it('as a nominal reaches from under to over, ends included, in any unit', () => {
    const body = limit({
      quantity: 'lifter-body-diameter',
      unit: 'in',
      per: 'lifter',
      figure: 'mean',
      nominal: { size: inches('0.8420'), plus: inches('0.0006'), minus: inches('0.0004') },
    });
    const pass = (text: string) =>
      evaluateClause(
        clause(body),
        facts({
          positions: { bores: bores('1I'), cylinders: [] },
          numbers: [number('lifter-body-diameter', '1I', text)],
        }),
      ).pass;
    expect(
      ['0.8415', '0.8416', '0.8426', '0.8427', '21.38 mm', '21.402 mm', '21.403 mm'].map(pass),
    ).toEqual([false, true, true, false, true, true, false]);
  });

  it('needs every position to pass and one to fail', () => {
    const found = facts({ numbers: [number('foot-less-body', '1I', '0.0002')] });
    expect(evaluateClause(clause(foot), found)).toMatchObject({
      state: 'not-measured',
      pass: null,
    });
    const reach = { ...found, couldNotBeReached: [{ position: '1E' }] };
    expect(evaluateClause(clause(foot), reach)).toMatchObject({
      state: 'could-not-be-reached',
      pass: null,
    });
    const bad = { ...reach, numbers: [number('foot-less-body', '1I', '0.0012')] };
    expect(evaluateClause(clause(foot), bad)).toMatchObject({ state: 'outside', pass: false });
    const all = { ...found, numbers: [...found.numbers, number('foot-less-body', '1E', '0.0003')] };
    const result = evaluateClause(clause(foot), all);
    expect(result).toMatchObject({ state: 'within', pass: true, sentence: '2 of 2 within.' });
  });

  it('on a sample is content with the sample', () => {
    const sampled = { ...foot, sample: { kind: 'some', count: 1 } } as const;
    const found = facts({ numbers: [number('foot-less-body', '1E', '0.0002')] });
    expect(evaluateClause(clause(sampled), found)).toMatchObject({ state: 'within', pass: true });
    expect(evaluateClause(clause(sampled), facts())).toMatchObject({
      state: 'not-measured',
      pass: null,
    });
  });

  it('takes the figure that the rule names', () => {
    const found = facts({
      positions: { bores: bores('1I'), cylinders: [] },
      numbers: [
        number('tappet-clearance', '1I', '0.0012', { figure: 'smallest' }),
        number('tappet-clearance', '1I', '0.0016', { figure: 'mean' }),
        number('tappet-clearance', '1I', '0.0021', { figure: 'largest' }),
      ],
    });
    const passes = (['smallest', 'mean', 'largest'] as const).map(
      (figure) => evaluateClause(clause(clearance({ figure })), found).pass,
    );
    expect(passes).toEqual([false, true, false]);
  });

  it('never turns a larger value past a maximum into a pass', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 2000 }),
        fc.integer({ min: 0, max: 2000 }),
        fc.integer({ min: 0, max: 40 }),
        (a, b, u) => {
          const [small, large] = [Math.min(a, b), Math.max(a, b)].map((n) =>
            evaluateClause(clause(foot), oneFoot(`${n} µin`, u / 100)),
          );
          const rank = (pass: boolean | null | undefined) => (pass === false ? 1 : 0);
          expect(rank(large?.pass)).toBeGreaterThanOrEqual(rank(small?.pass));
          expect(large?.pass === null && large.fit === true).toBe(false);
        },
      ),
    );
  });

  it('advisory never fails, whatever is measured', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -100, max: 100 }),
        fc.integer({ min: 0, max: 100 }),
        (tenths, u) => {
          const found = facts({
            numbers: ['1I', '1E'].map((key) =>
              number('tappet-clearance', key, `${tenths} tenths`, {
                figure: 'mean',
                standardUncertainty: (u / 10) * TENTH,
              }),
            ),
          });
          const result = evaluateClause(clause(clearance(), { force: 'advisory' }), found);
          expect(result.pass).not.toBe(false);
          expect(result.perPosition.some((row) => row.pass === false)).toBe(false);
        },
      ),
    );
  });
});

const answers = (subject: string, ...rows: readonly (readonly [string, string])[]) =>
  facts({ answers: rows.map(([position, answer]) => ({ subject, position, answer })) });

const type: Requirement = {
  kind: 'choice',
  subject: 'tappet-type',
  question: 'Which?',
  options: [
    { value: 'flat', label: 'Solid flat' },
    { value: 'roller', label: 'Roller' },
  ],
  allowed: ['flat'],
  per: 'engine',
};
const bushed: Requirement = {
  kind: 'yes-no',
  subject: 'bushed',
  question: 'Is the bore bushed?',
  required: 'no',
  per: 'bore',
};
const go: Requirement = {
  kind: 'plug-gauge',
  subject: 'restrictor',
  size: inches('1.2500'),
  gauge: 'no-go',
  where: 'the restrictor',
  per: 'engine',
};
const seal: Requirement = { kind: 'seal', subject: 'seal', place: 'the pan', count: 1 };

describe('an answer', () => {
  it.each<[string, Requirement, Facts, State, boolean | null]>([
    ['an allowed choice', type, answers('tappet-type', ['engine', 'flat']), 'complies', true],
    [
      'another choice',
      type,
      answers('tappet-type', ['engine', 'roller']),
      'does-not-comply',
      false,
    ],
    ['no choice', type, facts(), 'not-measured', null],
    ['per bore, all', bushed, answers('bushed', ['1I', 'no'], ['1E', 'no']), 'complies', true],
    ['per bore, for the engine', bushed, answers('bushed', ['engine', 'no']), 'complies', true],
    [
      'per bore, one differs',
      bushed,
      answers('bushed', ['engine', 'no'], ['1E', 'yes']),
      'does-not-comply',
      false,
    ],
    ['per bore, one open', bushed, answers('bushed', ['1I', 'no']), 'not-measured', null],
    [
      'a no-go gauge that passed',
      go,
      answers('restrictor', ['engine', 'passed']),
      'does-not-comply',
      false,
    ],
    [
      'a no-go gauge that did not',
      go,
      answers('restrictor', ['engine', 'did-not-pass']),
      'complies',
      true,
    ],
    [
      'a go gauge that passed',
      { ...go, gauge: 'go' } as Requirement,
      answers('restrictor', ['engine', 'passed']),
      'complies',
      true,
    ],
    ['a sound seal', seal, answers('seal', ['engine', 'intact']), 'complies', true],
    ['a broken seal', seal, answers('seal', ['engine', 'broken']), 'does-not-comply', false],
  ])('%s', (_, requirement, found, state, pass) => {
    const result = evaluateClause(clause(requirement), found);
    expect([result.state, result.pass]).toEqual([state, pass]);
    const advice = evaluateClause(clause(requirement, { force: 'advisory' }), found);
    expect(advice.pass).toBe(pass === false ? null : pass);
  });

  it('missing from the paperwork is open, not a breach', () => {
    const photograph: Requirement = {
      kind: 'photograph',
      subject: 'rack',
      visible: ['all lifters'],
    };
    expect(evaluateClause(clause(photograph), facts({ origin: 'declared' }))).toMatchObject({
      state: 'not-measured',
      pass: null,
    });
    const there = facts({ origin: 'declared', evidence: ['rack'] });
    expect(evaluateClause(clause(photograph), there).pass).toBe(true);
    expect(evaluateClause(clause(photograph), facts({ declared: there })).pass).toBe(true);
  });
});

describe('declared against found', () => {
  const casting: Requirement = {
    kind: 'matches-paperwork',
    subject: 'casting',
    question: 'Casting number',
    per: 'engine',
  };
  const declared = { ...answers('casting', ['engine', ' 30 12A ']), origin: 'declared' } as const;
  it.each<[string, Facts, State, boolean | null]>([
    ['declared', declared, 'complies', true],
    [
      'the same, spaces and capitals aside',
      { ...answers('casting', ['engine', '30  12a']), declared },
      'complies',
      true,
    ],
    ['another', { ...answers('casting', ['engine', '3013']), declared }, 'does-not-comply', false],
    ['nothing found yet', { ...facts(), declared }, 'not-measured', null],
    ['nothing declared', answers('casting', ['engine', '3013']), 'judged', null],
  ])('%s', (_, found, state, pass) => {
    const result = evaluateClause(clause(casting), found);
    expect([result.state, result.pass]).toEqual([state, pass]);
  });

  it('of a number differs only beyond the uncertainty', () => {
    const stroke: Requirement = {
      kind: 'matches-paperwork',
      subject: 'stroke',
      question: 'Stroke',
      per: 'engine',
    };
    const paper = facts({ origin: 'declared', numbers: [number('stroke', 'engine', '3.480')] });
    const found = (text: string) =>
      facts({
        declared: paper,
        numbers: [number('stroke', 'engine', text, { standardUncertainty: 0.000025 })],
      });
    expect(evaluateClause(clause(stroke), found('3.481')).pass).toBe(true);
    expect(evaluateClause(clause(stroke), found('3.490'))).toMatchObject({
      state: 'outside',
      pass: false,
    });
    expect(evaluateClause(clause(stroke), paper).pass).toBe(true);
  });
});

describe('an average of reference parts', () => {
  const rule = {
    kind: 'reference-average',
    quantity: 'lifter-weight',
    unit: 'g',
    per: 'lifter',
    n: 3,
    plus: { text: '1', unit: 'g' },
    minus: { text: '2', unit: 'g' },
    decisionRule: { kind: 'simple' },
    comparison: { method: 'absolute' },
  } as const satisfies Requirement;
  const part = (name: string, grams: string) =>
    ({
      quantity: 'lifter-weight',
      part: name,
      value: quantity('lifter-weight', grams),
      standardUncertainty: 0,
    }) as const;
  const parts = [part('R1', '90'), part('R2', '91'), part('R3', '92.5')];
  const found = (grams: string, references: Facts['references'] = parts) =>
    facts({
      positions: { bores: bores('1I'), cylinders: [] },
      numbers: [number('lifter-weight', '1I', grams)],
      references,
    });

  it.each([
    // The mean is 91 1/6 g: from 89 1/6 to 92 1/6.
    ['89.166', false],
    ['89.167', true],
    ['92.166', true],
    ['92.167', false],
  ])('at %s g', (grams, pass) => {
    expect(evaluateClause(clause(rule), found(grams)).pass).toBe(pass);
  });

  it('waits for the last part', () => {
    const result = evaluateClause(clause(rule), found('91', parts.slice(1)));
    expect(result).toMatchObject({ state: 'not-measured', pass: null });
    expect(result.sentence).toMatch(/2 of 3 reference parts/);
  });

  it('carries the reference parts’ uncertainty into U', () => {
    const unsure = parts.map((row) => ({ ...row, standardUncertainty: 0.003 }));
    const [row] = evaluateClause(clause(rule), found('91', unsure)).perPosition;
    // u = 3 g ÷ √3, U = 1.95996 u = 3.3948 g, rounded up.
    expect(row?.uncertainty?.text).toMatch(/^3\.39/);
  });
});

describe('all rules', () => {
  const waiver: Waiver = {
    id: 'w',
    number: 7,
    season: '2026',
    clause: '4.4',
    for: { kind: 'car', carNumber: '12J' },
    words: 'Bushed bores 1 to 4 may run.',
    reason: 'Old block',
    fromAt: '2026-01-01T00:00:00.000Z',
    untilAt: '2027-01-01T00:00:00.000Z',
  };
  const rules = { clauses: TAPPET_RULE_SET.clauses, waivers: [waiver] };
  const found = answers('bore-bushed', ['engine', 'yes']);

  it('leave plain text out and let the officials judge the rest', () => {
    const results = evaluateRules(rules, facts(), {});
    expect(results.map((row) => row.clause)).toEqual([
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
    expect(results.at(-1)).toMatchObject({ state: 'judged', pass: null, fit: null });
    expect(results.some((row) => row.pass !== null)).toBe(false);
  });

  it('are waived for the car that the waiver names, the finding still standing in words', () => {
    const at = (carNumber: string) =>
      evaluateRules(rules, found, { carNumber }).find((row) => row.clause === '4.4');
    expect(at('12')).toMatchObject({ state: 'does-not-comply', pass: false });
    expect(at('12J')).toMatchObject({ state: 'waived', pass: null });
    expect(at('12J')?.sentence).toMatch(/Waiver 7.*does not comply/);
  });

  it('do not waive an engine by an unnamed one', () => {
    const engine: Waiver = { ...waiver, for: { kind: 'engine', engineId: 'x', engineName: 'X' } };
    const result = evaluateRules({ ...rules, waivers: [engine] }, found, {}).find(
      (row) => row.clause === '4.4',
    );
    expect(result?.pass).toBe(false);
  });

  it('give results that survive JSON', () => {
    const results = evaluateRules(rules, { ...one('0.0016'), declared: facts() }, {});
    expect(JSON.parse(JSON.stringify(results))).toEqual(results);
    expect(JSON.stringify(results)).toContain('"0.0016"');
  });

  it('say where a lift is measured', () => {
    expect(evaluateClause(clause(lift()), facts()).limit).toBe('at most 0.480 in');
  });
});
