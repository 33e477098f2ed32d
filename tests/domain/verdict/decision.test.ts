import { describe, expect, it } from 'vitest';
import { beforeDeciding, type Deciding } from '@/domain/verdict/before-deciding';
import { computedStatement } from '@/domain/verdict/computed-statement';
import {
  decidableClauses,
  decisionFaults,
  isAgainstStatement,
  penaltyRowsFor,
  penaltyWords,
} from '@/domain/verdict/decision';
import { findMinor, moneyWords } from '@/domain/verdict/money';
import { suggestedDecision } from '@/domain/verdict/suggested-decision';
import { BREACH, NO_BREACH, STREET_EIGHT } from '../../support/verdict-case';

const finding = (clause: string, pass: boolean | null, advisory = false) => ({
  clause,
  pass,
  advisory,
});

describe('the computed statement', () => {
  it('fails on one mandatory finding that fails, whatever the others say', () => {
    expect(computedStatement([finding('4.1', true), finding('4.3', false)])).toBe('fail');
    expect(computedStatement([finding('4.1', null), finding('4.3', false)])).toBe('fail');
  });

  it('passes where a mandatory finding passes and none fails', () => {
    expect(computedStatement([finding('4.1', true), finding('4.2', null)])).toBe('pass');
  });

  it('is none where no mandatory clause has a statement', () => {
    expect(computedStatement([])).toBe('none');
    expect(computedStatement([finding('4.2', null)])).toBe('none');
  });

  it('takes no notice of advisory findings', () => {
    expect(computedStatement([finding('4.6', false, true)])).toBe('none');
    expect(computedStatement([finding('4.6', false, true), finding('4.1', true)])).toBe('pass');
  });
});

describe('a new decision', () => {
  const steps = STREET_EIGHT.penalties.map(({ row }, at) => ({ row, nextStep: at + 2 }));
  const suggested = (...findings: ReturnType<typeof finding>[]) =>
    suggestedDecision(STREET_EIGHT, findings, steps);

  it('is filled in with the failing clauses and the next step of the row that they name', () => {
    expect(suggested(finding('4.1', true), finding('4.3', false))).toEqual({
      decision: 'breach',
      clauses: ['4.3'],
      penalty: { row: 'A', step: 2 },
    });
  });

  it('says no breach where all is kept, and nothing where nothing was stated', () => {
    expect(suggested(finding('4.1', true))).toMatchObject({ decision: 'no-breach', clauses: [] });
    expect(suggested(finding('4.1', null))).toEqual({ clauses: [], penalty: null });
    expect(suggested(finding('4.6', false, true))).toEqual({ clauses: [], penalty: null });
  });

  it('leaves the penalty to choose where no failing clause names its row', () => {
    const rules = {
      ...STREET_EIGHT,
      clauses: STREET_EIGHT.clauses.map(({ penaltyRow: _, ...clause }) => clause),
    };
    expect(suggestedDecision(rules, [finding('4.3', false)], steps)).toMatchObject({
      clauses: ['4.3'],
      penalty: null,
    });
  });
});

describe('a decision', () => {
  const failing = [finding('4.1', true), finding('4.3', false), finding('4.6', null, true)];
  const faults = (draft: typeof BREACH, findings = failing) =>
    decisionFaults(draft, STREET_EIGHT, findings).map(({ pointer }) => pointer);

  it('of breach rests on a mandatory clause that the report names', () => {
    expect(decidableClauses(STREET_EIGHT, failing)).toEqual(['4.1', '4.3']);
    expect(faults(BREACH)).toEqual([]);
    expect(faults({ ...BREACH, clauses: ['4.6'] })).toContain('/clauses');
    expect(faults({ ...BREACH, clauses: ['6'] })).toContain('/clauses');
    expect(faults(BREACH, [finding('4.1', true)])).toContain('/clauses');
  });

  it('of breach cannot rest on readings that make no statement, whatever its reasons', () => {
    const sentence = '1 intake: no statement, since gauge CAL-01 was overdue for calibration.';
    const silent = { state: 'no-statement', pass: null, sentence } as const;
    const within = { state: 'within', pass: true, sentence: 'within' } as const;
    const near = { state: 'too-close', pass: true, sentence: 'too close to call' } as const;
    const outside = { state: 'outside', pass: false, sentence: 'outside' } as const;
    const on = (
      ...perPosition: readonly (typeof silent | typeof within | typeof near | typeof outside)[]
    ) =>
      decisionFaults({ ...BREACH, againstComputedBecause: 'We saw it.' }, STREET_EIGHT, [
        {
          ...finding('4.3', perPosition.some(({ pass }) => pass === false) ? false : null),
          perPosition,
        },
      ]).map(({ detail }) => detail);
    const refused = [`No breach of clause 4.3 can be decided on these readings. ${sentence}`];
    expect(on(silent)).toEqual(refused);
    expect(on(within, silent)).toEqual(refused);
    expect(on(within)).toEqual([]);
    expect(on(near, silent)).toEqual([]);
    expect(on(outside, silent)).toEqual([]);
  });

  it('that is not what the findings say needs its reason, also on a single clause', () => {
    expect(isAgainstStatement(BREACH, failing)).toBe(false);
    expect(isAgainstStatement(NO_BREACH, failing)).toBe(true);
    expect(isAgainstStatement({ ...BREACH, clauses: ['4.1', '4.3'] }, failing)).toBe(true);
    expect(faults(NO_BREACH)).toEqual(['/againstComputedBecause']);
    expect(faults({ ...NO_BREACH, againstComputedBecause: 'Wrong lifters.' })).toEqual([]);
    expect(faults({ ...NO_BREACH, againstComputedBecause: ' \n' })).toEqual([
      '/againstComputedBecause',
    ]);
  });

  it('of no breach carries neither clause nor penalty nor fine', () => {
    const pass = [finding('4.1', true)];
    expect(faults(NO_BREACH, pass)).toEqual([]);
    expect(faults({ ...NO_BREACH, clauses: ['4.1'] }, pass)).toEqual(['/decision']);
    expect(faults({ ...NO_BREACH, penalty: { row: 'A', step: 1 } }, pass)).toEqual(['/decision']);
    expect(faults({ ...NO_BREACH, moneyMinor: 100 }, pass)).toEqual(['/decision']);
  });

  it('takes its penalty from the rows that the breached clauses name', () => {
    expect(penaltyRowsFor(STREET_EIGHT, ['4.3']).map(({ row }) => row)).toEqual(['A']);
    expect(penaltyRowsFor(STREET_EIGHT, ['3.2', '4.3']).map(({ row }) => row)).toEqual(['A', 'B']);
    const [a] = STREET_EIGHT.penalties;
    if (a === undefined) throw new Error('no row');
    expect(penaltyWords(a, 9)).toBe('No entry for the rest of the season');
    expect(faults({ ...BREACH, penalty: { row: 'A', step: 0 } })).toEqual(['/penalty']);
  });
});

describe('before anybody decides', () => {
  const ready: Deciding = {
    actorId: 'o',
    signedBy: ['i'],
    takenBy: ['i', 'j'],
    competitorId: 'c',
    reportRevision: 1,
    publishedNotice: null,
  };
  const unmet = (more: Partial<Deciding>) =>
    beforeDeciding({ ...ready, ...more })
      .filter(({ met }) => !met)
      .map(({ key }) => key);

  it('all must be so', () => {
    expect(unmet({})).toEqual([]);
    expect(unmet({ reportRevision: null })).toEqual(['signed']);
    expect(unmet({ signedBy: ['i', 'o'] })).toEqual(['not-yours']);
    expect(unmet({ takenBy: ['o'] })).toEqual(['not-yours']);
    expect(unmet({ competitorId: 'o' })).toEqual(['no-interest']);
    expect(unmet({ publishedNotice: '2026-001' })).toEqual(['open']);
  });
});

describe('money', () => {
  it('is read and written exactly, in the currency’s own steps', () => {
    expect(moneyWords({ minor: '25000', currency: 'USD' })).toBe('250 USD');
    expect(moneyWords({ minor: '5', currency: 'USD' })).toBe('0.05 USD');
    expect(moneyWords({ minor: '1250', currency: 'JPY' })).toBe('1250 JPY');
    expect(findMinor('12,5', 'USD')).toBe(1250);
    expect(findMinor('12', 'JPY')).toBe(12);
    expect(findMinor('12.5', 'JPY')).toBeUndefined();
    expect(findMinor('12.505', 'USD')).toBeUndefined();
    expect(findMinor('-1', 'USD')).toBeUndefined();
  });
});
