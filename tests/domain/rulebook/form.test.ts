import { describe, expect, it } from 'vitest';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { clause, clearance } from './build';

describe('the paperwork of the tappet rule set', () => {
  const form = paperworkForm(TAPPET_RULE_SET);

  it('asks what the rules ask, eight questions at most', () => {
    expect(form.questions.map((row) => [row.subject, row.kind, row.per])).toEqual([
      ['displacement', 'number', 'engine'],
      ['block-casting-number', 'text', 'engine'],
      ['tappet-type', 'choice', 'engine'],
      ['bore-bushed', 'yes-no', 'bore'],
    ]);
  });

  it('lists each photograph with what must be visible', () => {
    expect(form.photographs).toEqual([
      {
        subject: 'lifters-racked',
        clause: '5.1',
        heading: 'Photograph of the lifters',
        visible: ['all lifters racked by bore', 'a scale', 'the car number'],
      },
    ]);
  });

  it('has one lifter sheet with the columns that the limits need, and a cam card', () => {
    expect(
      form.sheets.map((row) => [
        row.sheet,
        row.subject,
        row.per,
        row.columns.map((column) => [column.quantity, ...column.clauses]),
      ]),
    ).toEqual([
      [
        'lifters',
        'lifter-sheet',
        'bore',
        [
          ['lifter-body-diameter', '4.2', '4.3', '4.6'],
          ['foot-diameter', '4.3'],
          ['tappet-bore-diameter', '4.6'],
        ],
      ],
      ['camshaft', 'cam-sheet', 'bore', [['valve-lift', '4.5']]],
    ]);
    expect(form.sheets[0]?.clauses).toEqual(['5.2', '4.2', '4.3', '4.6']);
  });
});

describe('the paperwork of any rules', () => {
  it('keeps tables per cylinder and per bore apart', () => {
    const form = paperworkForm(ENGINE_RULE_SET);
    expect(form.sheets.map((row) => [row.sheet, row.per])).toEqual([
      ['engine', 'cylinder'],
      ['engine', 'bore'],
      ['camshaft', 'bore'],
    ]);
  });

  it('asks once what two clauses want, with the stronger of the two', () => {
    const rule = {
      kind: 'yes-no',
      subject: 'bushed',
      question: 'Bushed?',
      required: 'no',
      per: 'engine',
    } as const;
    const form = paperworkForm({
      clauses: [clause(rule, { number: '1', force: 'advisory' }), clause(rule, { number: '2' })],
    });
    expect(form.questions).toHaveLength(1);
    expect(form.questions[0]).toMatchObject({ clauses: ['1', '2'], force: 'mandatory' });
  });

  it('asks for a named file that no limit fills', () => {
    const rule = {
      kind: 'sheet',
      subject: 'dyno',
      sheet: 'other',
      title: 'Dynamometer sheet',
    } as const;
    const form = paperworkForm({ clauses: [clause(rule), clause(clearance(), { number: '5' })] });
    expect(form.sheets.map((row) => [row.title, row.columns.length])).toEqual([
      ['Lifter sheet, one row per bore', 2],
      ['Dynamometer sheet', 0],
    ]);
  });

  it('of plain text is empty', () => {
    const form = paperworkForm({ clauses: [clause(undefined, { force: 'text' })] });
    expect(form).toEqual({ questions: [], photographs: [], sheets: [] });
  });
});
