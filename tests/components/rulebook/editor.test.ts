import { describe, expect, it } from 'vitest';
import { unsaidNumbers } from '@/components/rulebook/editor/clause/unsaid-numbers';
import { draftState, reduceDraft } from '@/components/rulebook/editor/edition/draft-state';
import {
  numberBeside,
  numberUnder,
  renumber,
} from '@/components/rulebook/editor/edition/numbering';
import { findChoices, joined } from '@/components/rulebook/editor/saving/join-drafts';
import { editionFrom, editionParts } from '@/components/rulebook/editor/saving/parts';
import type { Clause } from '@/domain/rulebook/clause';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';

const clause = (number: string, words = '', refs?: readonly string[]): Clause => ({
  number,
  heading: number,
  words,
  force: 'text',
  ...(refs && { refs }),
});
const rows = (...clauses: readonly Clause[]) =>
  clauses.map((one, i) => ({ key: `c${i}`, clause: one }));
const draft = (...clauses: readonly Clause[]) => ({
  title: 'Draft',
  content: { clauses, penalties: [] },
});

describe('numbering', () => {
  const some = rows(clause('1'), clause('1.9'), clause('1.10'), clause('2', '', ['1.9', '1']));

  it('offers the next free number at a level', () => {
    expect(numberBeside(some, '1.9')).toBe('1.11');
    expect(numberBeside(some, undefined)).toBe('3');
    expect(numberUnder(some, '2')).toBe('2.1');
    expect(numberUnder([], undefined)).toBe('1');
  });

  it('takes along what stands below, and what refers to it', () => {
    const moved = renumber(some, 'c0', '7').map((row) => [row.clause.number, row.clause.refs]);
    expect(moved).toEqual([
      ['2', ['7.9', '7']],
      ['7', undefined],
      ['7.9', undefined],
      ['7.10', undefined],
    ]);
  });

  it('moves one of two clauses of one number alone, and nobody’s references', () => {
    const twice = rows(clause('1'), clause('1'), clause('1.1'), clause('2', '', ['1']));
    const moved = renumber(twice, 'c1', '3');
    expect(moved.map((row) => row.clause.number)).toEqual(['1', '1.1', '2', '3']);
    expect(moved[2]?.clause.refs).toEqual(['1']);
  });
});

describe('a removed clause', () => {
  it('can be put back where it stood', () => {
    const start = draftState(draft(clause('1'), clause('2')));
    const without = reduceDraft(start, { do: 'remove', key: 'c0' });
    expect(without.rows).toHaveLength(1);
    expect(reduceDraft(without, { do: 'put-back' }).rows).toEqual(start.rows);
  });
});

describe('two drafts from one', () => {
  const base = draft(clause('1', 'a'), clause('2', 'b'), clause('3', 'c'), clause('4', 'd'));
  const mine = draft(clause('1', 'A'), clause('2', 'mine'), clause('3', 'c'), clause('5', 'new'));
  const theirs = draft(clause('1', 'a'), clause('2', 'theirs'), clause('4', 'D'));
  const choices = findChoices(editionParts(base), editionParts(mine), editionParts(theirs));

  it('differ part by part, and say who changed what', () => {
    expect(choices.map(({ id, suggested }) => [id, suggested])).toEqual([
      ['clause 1', 'mine'],
      ['clause 2', undefined],
      ['clause 3', 'theirs'],
      ['clause 5', 'mine'],
      ['clause 4', undefined],
    ]);
  });

  it('come together as chosen: changed, removed, kept and new', () => {
    const picked = new Map([
      ['clause 1', 'mine'],
      ['clause 2', 'theirs'],
      ['clause 3', 'theirs'],
      ['clause 5', 'mine'],
      ['clause 4', 'theirs'],
    ] as const);
    const { content } = editionFrom(joined(editionParts(mine), choices, picked));
    expect(content.clauses.map(({ number, words }) => [number, words])).toEqual([
      ['1', 'A'],
      ['2', 'theirs'],
      ['4', 'D'],
      ['5', 'new'],
    ]);
  });

  it('that are the same leave nothing to choose, and lose nothing', () => {
    const parts = editionParts(mine);
    expect(findChoices(editionParts(base), parts, parts)).toEqual([]);
    expect(editionFrom(parts)).toEqual(mine);
  });
});

describe('words beside a limit', () => {
  it.each([TAPPET_RULE_SET, ENGINE_RULE_SET, WEIGHTS_RULE_SET])(
    'say its numbers: $title',
    (set) => {
      const left = set.clauses.flatMap((one) =>
        unsaidNumbers(one).map((number) => `${one.number}: ${number}`),
      );
      expect(left).toEqual([]);
    },
  );

  it('are asked about when only the limit was changed', () => {
    const lift = TAPPET_RULE_SET.clauses.find((one) => one.number === '4.5');
    if (lift?.requirement?.kind !== 'limit') throw new Error('no limit');
    const max = { text: '0.4500', unit: 'in' };
    const changed = { ...lift, requirement: { ...lift.requirement, max } };
    expect(unsaidNumbers(changed)).toEqual(['0.4500 in']);
  });
});
