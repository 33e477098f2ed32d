import { describe, expect, test } from 'vitest';
import { isAnswered, placeAnswers, placesOf } from '@/domain/paperwork/answers';
import { declare } from '@/domain/paperwork/declare';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { type DraftAnswer, EMPTY_DRAFT, withAnswer } from '@/domain/paperwork/draft';
import { stillMissing } from '@/domain/paperwork/still-missing';
import type { Clause } from '@/domain/rulebook/clause';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { ORDER } from './shapes';

const layout = GENERIC_LAYOUTS[0]!;

const clause = (number: string, requirement: NonNullable<Clause['requirement']>): Clause => ({
  number,
  heading: number,
  words: number,
  force: 'mandatory',
  requirement,
});

const clauses: readonly Clause[] = [
  clause('1', {
    kind: 'choice',
    subject: 'tappet-type',
    question: 'Which type are the tappets?',
    options: [
      { value: 'flat', label: 'Solid flat' },
      { value: 'roller', label: 'Solid roller' },
    ],
    allowed: ['flat'],
    per: 'lifter',
  }),
  clause('2', {
    kind: 'yes-no',
    subject: 'bore-bushed',
    question: 'Are the bores bushed?',
    required: 'no',
    per: 'bore',
  }),
  clause('3', {
    kind: 'matches-paperwork',
    subject: 'lifter-height',
    question: 'Lifter height',
    per: 'lifter',
  }),
  clause('4', {
    kind: 'matches-paperwork',
    subject: 'lifter-marking',
    question: 'Marking on the lifter',
    per: 'lifter',
  }),
];
const rules = { clauses, waivers: [] };
const form = paperworkForm(rules);
const [type, bushed, height, marking] = form.questions;

const draftOf = (answers: readonly DraftAnswer[]) =>
  answers.reduce((draft, answer) => withAnswer(draft, answer), EMPTY_DRAFT);
const say = (subject: string, position: string, typed: string): DraftAnswer => ({
  subject,
  position,
  typed,
});
const check = (answers: readonly DraftAnswer[], number: string) =>
  evaluateRules(rules, declaredFacts(declare(draftOf(answers), form, layout, [])), {}).find(
    (result) => result.clause === number,
  )!;

describe('questions that the rules ask per bore', () => {
  test('have every bore of this engine for a place, in its order', () => {
    expect(
      placesOf(type!, layout)
        .map(({ key }) => key)
        .toSorted(),
    ).toEqual([...ORDER].toSorted());
    expect(placesOf({ per: 'engine' }, layout)).toEqual([]);
  });

  test('one answer serves all; a bore that differs is judged by its own', () => {
    const answers = [
      say('tappet-type', 'engine', 'flat'),
      say('tappet-type', '3 intake', 'roller'),
    ];
    const result = check(answers, '1');
    const states = result.perPosition.filter(({ state }) => state === 'does-not-comply');
    expect(states.map(({ position }) => position)).toEqual(['3 intake']);
    expect(result.pass).toBe(false);
    expect(placeAnswers(draftOf(answers), type!, layout)).toHaveLength(1);
  });

  test('are answered by one for the whole, or by one for every bore, and by nothing less', () => {
    const each = ORDER.map((place) => say('bore-bushed', place, 'no'));
    expect(isAnswered(draftOf([say('bore-bushed', 'engine', 'no')]), bushed!, layout)).toBe(true);
    expect(isAnswered(draftOf(each), bushed!, layout)).toBe(true);
    expect(isAnswered(draftOf(each.slice(1)), bushed!, layout)).toBe(false);
    expect(isAnswered(EMPTY_DRAFT, bushed!, layout)).toBe(false);
  });

  test('one bore that cannot be read holds the question open: it is not passed over', () => {
    const good = say('lifter-height', 'engine', '2.000');
    const bad = say('lifter-height', '3 intake', 'about two');
    expect(isAnswered(draftOf([good]), height!, layout)).toBe(true);
    expect(isAnswered(draftOf([good, bad]), height!, layout)).toBe(false);
    const missing = stillMissing(draftOf([good, bad]), rules, form, layout, []);
    expect(missing.questions.map(({ subject }) => subject)).toContain('lifter-height');
  });

  test('what must be as declared is declared at every bore by one answer', () => {
    const result = check([say('lifter-marking', 'engine', 'K7')], '4');
    expect(new Set(result.perPosition.map(({ state }) => state))).toEqual(new Set(['complies']));
    expect(marking?.per).toBe('lifter');
  });
});
