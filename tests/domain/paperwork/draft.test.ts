import { describe, expect, test } from 'vitest';
import { boreMarks } from '@/domain/paperwork/bore-marks';
import { declare } from '@/domain/paperwork/declare';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { EMPTY_DRAFT, type PaperworkDraft, withAnswer, withCells } from '@/domain/paperwork/draft';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import type { SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import { isComplete, missingWords, stillMissing } from '@/domain/paperwork/still-missing';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { ORDER } from './shapes';

const rules = { clauses: TAPPET_RULE_SET.clauses, waivers: [] };
const form = paperworkForm(rules);
const layout = GENERIC_LAYOUTS[0]!;

const cell = (position: string, quantity: SheetCell['quantity'], typed: string): SheetCell => ({
  position,
  quantity,
  depth: '',
  axis: '',
  typed,
  unit: 'in',
});
const full = (bore: (p: string) => string = () => '0.8440'): readonly SheetCell[] =>
  ORDER.flatMap((p) => [
    cell(p, 'lifter-body-diameter', '0.8423'),
    cell(p, 'foot-diameter', '0.8420'),
    cell(p, 'tappet-bore-diameter', bore(p)),
  ]);

const answers: readonly (readonly [string, string])[] = [
  ['tappet-type', 'flat'],
  ['bore-bushed', 'no'],
  ['displacement', '361.4'],
  ['block-casting-number', '41-7730'],
];
const answered = answers.reduce<PaperworkDraft>(
  (draft, [subject, typed]) => withAnswer(draft, { subject, position: 'engine', typed }),
  EMPTY_DRAFT,
);
const photo = { item: 'lifters-racked', purpose: 'photograph' } as const;

describe('what stands between a draft and handing it in', () => {
  test('an empty draft lacks every answer, photograph and value', () => {
    const missing = stillMissing(EMPTY_DRAFT, rules, form, layout, []);
    expect(missingWords(missing)).toBe('4 answers, 1 photograph and 48 values missing');
    expect(isComplete(missing)).toBe(false);
  });

  test('a full one lacks nothing, though a bore lies outside an advisory window', () => {
    const draft = withCells(
      answered,
      'lifter-sheet',
      full((p) => (p === '3 exhaust' ? '0.8446' : '0.8440')),
    );
    const missing = stillMissing(draft, rules, form, layout, [photo]);
    expect(missingWords(missing)).toBe('');
    expect(isComplete(missing)).toBe(true);
  });

  test('cells that are no number or in question are to be corrected', () => {
    const cells = full((p) =>
      p === '3 intake' ? '0.84.41' : p === '6 exhaust' ? '0.8840' : '0.8440',
    );
    const missing = stillMissing(withCells(answered, 'lifter-sheet', cells), rules, form, layout, [
      photo,
    ]);
    expect(missingWords(missing)).toBe('2 cells to correct');
  });

  test('an answer that is no number does not count as given, and stays as typed', () => {
    const draft = withAnswer(answered, {
      subject: 'displacement',
      position: 'engine',
      typed: 'about 360',
    });
    expect(stillMissing(draft, rules, form, layout, []).questions.map((q) => q.subject)).toEqual([
      'displacement',
    ]);
    expect(draft.answers.find((a) => a.subject === 'displacement')?.typed).toBe('about 360');
  });
});

describe('the draft against the rules', () => {
  const check = (draft: PaperworkDraft) =>
    evaluateRules(rules, declaredFacts(declare(draft, form, layout, [])), {});

  test('numbers in question are not checked until they are put right', () => {
    const cells = full((p) => (p === '3 intake' ? '0.84.41' : '0.8440'));
    const body = check(withCells(answered, 'lifter-sheet', cells)).find((r) => r.clause === '4.6')!;
    const states = Object.fromEntries(body.perPosition.map((row) => [row.position, row.state]));
    expect(states['3 intake']).toBe('not-measured');
    expect(states['3 exhaust']).toBe('within');
  });

  test('the map marks what to correct, what is outside, what is there and what is not', () => {
    const cells = full(
      (p) => ({ '3 intake': '0.84.41', '3 exhaust': '0.8446' })[p] ?? '0.8440',
    ).filter((one) => one.position !== '8 intake');
    const draft = withCells(answered, 'lifter-sheet', cells);
    const sheet = form.sheets.find((one) => one.subject === 'lifter-sheet')!;
    const marks = boreMarks(layout, sheet, judgeCells(cells), check(draft));
    expect(marks.size).toBe(16);
    expect(['3 intake', '3 exhaust', '8 intake', '1 intake'].map((key) => marks.get(key))).toEqual([
      'to-correct',
      'outside',
      'not-measured',
      'within',
    ]);
  });

  test('a comma, a unit beside the answer and spaces are taken as they are written', () => {
    const draft = withAnswer(EMPTY_DRAFT, {
      subject: 'displacement',
      position: 'engine',
      typed: ' 5922,4 cc ',
    });
    expect(declare(draft, form, layout, []).answers).toEqual([
      { subject: 'displacement', position: 'engine', written: { text: '5922,4', unit: 'cc' } },
    ]);
  });
});
