import { describe, expect, it } from 'vitest';
import { inches } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { tryRules } from '@/domain/rulebook/trial/try-rules';
import { facts, number } from './build';

const rules = { clauses: TAPPET_RULE_SET.clauses, waivers: [] };
const stricter = {
  ...rules,
  clauses: rules.clauses.map((clause) =>
    clause.number === '4.3' && clause.requirement?.kind === 'limit'
      ? { ...clause, requirement: { ...clause.requirement, max: inches('0.0005') } }
      : clause,
  ),
};

const engine = (id: string, foot: string) => ({
  id,
  name: `Engine ${id}`,
  bearer: {},
  facts: facts({
    origin: 'declared',
    numbers: [number('foot-less-body', '1I', foot), number('foot-less-body', '1E', '0.0001')],
  }),
});
const cases = [engine('a', '0.0004'), engine('b', '0.0008'), engine('c', '0.0015')];

describe('a trial of rules on past engines', () => {
  it('lists what fails', () => {
    const trial = tryRules(rules, cases);
    expect(trial.sentence).toBe('This would fail 1 of 3 engines.');
    expect(trial.failed.map((row) => row.id)).toEqual(['c']);
  });

  it('lists only what a change would make illegal, with its clauses', () => {
    const trial = tryRules(stricter, cases, rules);
    expect(trial.tried).toBe(3);
    expect(trial.failed.map((row) => [row.id, row.results.map((result) => result.clause)])).toEqual(
      [['b', ['4.3']]],
    );
    expect(tryRules(stricter, cases, stricter).failed).toEqual([]);
  });

  it('speaks of one engine as one', () => {
    expect(tryRules(rules, cases.slice(0, 1)).sentence).toBe('This would fail 0 of 1 engine.');
  });
});
