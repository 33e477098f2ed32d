import { describe, expect, test } from 'vitest';
import { checkingLiftIn, lobesOf } from '@/domain/paperwork/cam/cam-table';
import { declare } from '@/domain/paperwork/declare';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { EMPTY_DRAFT, type PaperworkDraft, withCells } from '@/domain/paperwork/draft';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { sheetRows } from '@/domain/paperwork/sheet/positions';
import { readSheet } from '@/domain/paperwork/sheet/read-sheet';
import type { SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import { sheetTemplate, templateRows } from '@/domain/paperwork/sheet/template';
import { incompletePlaces, stillMissing } from '@/domain/paperwork/still-missing';
import type { Clause } from '@/domain/rulebook/clause';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const layout = GENERIC_LAYOUTS[0]!;

const TABLE: Clause = {
  number: '2',
  heading: 'Cam table',
  words: 'The builder’s cam table gives the lift of each lobe by degree.',
  force: 'mandatory',
  penaltyRow: 'B',
  requirement: {
    kind: 'sheet',
    subject: 'cam-table',
    sheet: 'lift-table',
    title: 'Cam table, lift by degree',
  },
};

const lift = (max: string): Clause => ({
  number: '3',
  heading: 'Lobe lift',
  words: `Lobe lift at the pushrod is at most ${max} in.`,
  force: 'mandatory',
  penaltyRow: 'A',
  requirement: limit({
    quantity: 'lobe-lift',
    unit: 'in',
    per: 'bore',
    datum: 'at the pushrod',
    lash: inches('0.000'),
    checkingLifter: 'solid',
    max: inches(max),
  }),
});

const duration = (max: string, datum = 'between 0.050 in lift rising and falling'): Clause => ({
  number: '4',
  heading: 'Duration',
  words: `Duration is at most ${max} degrees.`,
  force: 'mandatory',
  penaltyRow: 'A',
  requirement: limit({
    quantity: 'duration',
    unit: 'deg',
    per: 'bore',
    datum,
    lash: inches('0.000'),
    checkingLifter: 'solid',
    max: { text: max, unit: 'deg' },
  }),
});

const rulesOf = (...clauses: readonly Clause[]) => ({
  series: 's',
  className: 'c',
  season: '2026',
  edition: 1,
  bulletins: [],
  clauses,
  penalties: [],
  waivers: [],
  clarifications: [],
});

/** Worked by hand: at 0.050 in the intake opens at 30 and closes at 170, the exhaust at 410 and 560. */
const ROWS = [
  ['0', '0.0000', ''],
  ['20', '0.0200', ''],
  ['40', '0.0800', ''],
  ['60', '0.2000', ''],
  ['80', '0.3100', ''],
  ['100', '0.3200', ''],
  ['120', '0.3000', ''],
  ['140', '0.1900', ''],
  ['160', '0.0700', ''],
  ['180', '0.0300', ''],
  ['200', '0.0000', ''],
  ['390', '', '0.0000'],
  ['410', '', '0.0500'],
  ['450', '', '0.2500'],
  ['480', '', '0.3300'],
  ['520', '', '0.2400'],
  ['560', '', '0.0500'],
  ['580', '', '0.0000'],
] as const;

const HEAD = ['Crank degrees', 'Intake lift (in)', 'Exhaust lift (in)'];

const formOf = (...clauses: readonly Clause[]) =>
  paperworkForm({ clauses }).sheets.find(({ sheet }) => sheet === 'lift-table')!;
const wanted = { form: formOf(TABLE, lift('0.3200')), layout };

const read = (rows: readonly (readonly string[])[]) =>
  readSheet(rows, wanted, { fileId: 'f', name: 'cam.csv' });

const draftWith = (cells: readonly SheetCell[]): PaperworkDraft =>
  withCells(EMPTY_DRAFT, 'cam-table', cells);

const factsOf = (cells: readonly SheetCell[], ...clauses: readonly Clause[]) =>
  declaredFacts(declare(draftWith(cells), paperworkForm({ clauses }), layout, []), { clauses });

const stateOf = (clause: Clause, cells: readonly SheetCell[]) => {
  const rules = rulesOf(TABLE, clause);
  const [, result] = evaluateRules(
    rules as unknown as Parameters<typeof evaluateRules>[0],
    factsOf(cells, TABLE, clause),
    { carNumber: '1', engineId: 'e' },
  );
  return {
    state: result?.state,
    outside: result?.perPosition
      .filter(({ state }) => state === 'outside')
      .map(({ position }) => position.split(' ')[1]),
  };
};

describe('what the rules ask for', () => {
  test('a clause that asks for it makes a sheet by degree, of the lift that the rules limit', () => {
    expect(wanted.form).toMatchObject({
      sheet: 'lift-table',
      per: 'degree',
      title: 'Cam table, lift by degree',
      columns: [{ quantity: 'lobe-lift', unit: 'in' }],
      clauses: ['2', '3'],
    });
    const atTheValve: Clause = {
      ...lift('0.48'),
      requirement: {
        ...lift('0.48').requirement!,
        quantity: 'valve-lift',
      } as Clause['requirement'],
    };
    expect(formOf(TABLE, atTheValve).columns[0]?.quantity).toBe('valve-lift');
    expect(formOf(TABLE).columns[0]?.quantity).toBe('lobe-lift');
  });

  test('the template has a row every ten degrees, and reads back by itself', () => {
    const about = { carNumber: '7', reference: 'E', className: 'C', paperworkId: 'p' };
    const rows = templateRows(sheetTemplate(wanted, about, 'metric'));
    const heading = rows.find(([first]) => first === 'Crankshaft degrees');
    expect(heading).toEqual([
      'Crankshaft degrees',
      'intake Lobe lift (mm)',
      'exhaust Lobe lift (mm)',
    ]);
    expect(rows.at(-1)?.[0]).toBe('720');
    const filled = rows.map((row) => (/^\d+$/.test(row[0] ?? '') ? [row[0]!, '1.2', '3.4'] : row));
    const { cells, notes } = read(filled);
    expect(notes).toEqual([]);
    expect(cells.length).toBe(146);
    expect(cells[1]).toMatchObject({ position: '0', axis: 'exhaust', typed: '3.4', unit: 'mm' });
  });
});

describe('a table as somebody made it', () => {
  test('every lift goes to its angle and lobe, with file and cell', () => {
    const { cells, columns, notes } = read([['Cam 44', 'ground in May'], HEAD, ...ROWS]);
    expect(notes).toEqual([]);
    expect(columns.map(({ meaning }) => meaning.kind)).toEqual(['position', 'reading', 'reading']);
    expect(cells.length).toBe(18);
    expect(cells.find(({ position }) => position === '480')).toEqual({
      position: '480',
      quantity: 'lobe-lift',
      depth: '',
      axis: 'exhaust',
      typed: '0.3300',
      unit: 'in',
      source: { fileId: 'f', file: 'cam.csv', cell: 'C17' },
    });
  });

  test.each([
    [
      'angles below zero, with their sign',
      [
        ['Angle', 'Int', 'Exh'],
        ['−10', '0.01', '0.2'],
        ['0', '0.05', '0.1'],
        ['10.50', '0.1', '0.05'],
      ],
      ['-10', '0', '10.5'],
    ],
    [
      'decimal commas',
      [
        ['Grad KW', 'Einlass mm', 'Auslass mm'],
        ['0,5', '1,2', '3,4'],
        ['1,5', '1,3', '3,5'],
        ['2,5', '1,4', '3,6'],
      ],
      ['0.5', '1.5', '2.5'],
    ],
    [
      'degrees across the first row',
      [
        ['Degrees', '0', '10', '20', '30'],
        ['Intake lift', '0', '0.1', '0.2', '0.1'],
        ['Exhaust lift', '0', '0.1', '0.2', '0.1'],
      ],
      ['0', '10', '20', '30'],
    ],
  ])('%s', (_, rows, positions) => {
    const { cells } = read(rows);
    expect([...new Set(cells.map(({ position }) => position))].sort()).toEqual(
      [...positions].sort(),
    );
    expect(new Set(cells.map(({ axis }) => axis))).toEqual(new Set(['intake', 'exhaust']));
    expect(judgeCells(cells).every(({ state }) => state === 'ok')).toBe(true);
  });

  test('two lobes side by side, each with angles of its own', () => {
    const { cells } = read([
      ['Deg', 'Intake lift', 'Deg', 'Exhaust lift'],
      ['10', '0.11', '400', '0.21'],
      ['20', '0.12', '410', '0.22'],
      ['30', '0.13', '420', '0.23'],
    ]);
    expect(cells.map(({ position, axis }) => `${position} ${axis}`)).toEqual([
      '10 intake',
      '400 exhaust',
      '20 intake',
      '410 exhaust',
      '30 intake',
      '420 exhaust',
    ]);
  });

  test('a lift of nobody knows which lobe is asked about; a row without an angle and one twice are named', () => {
    const { columns, notes } = read([
      ['Degrees', 'Lift', 'Exhaust'],
      ['0', '0.1', '0.1'],
      ['10', '0.2', '0.2'],
      ['top', '0.3', '0.3'],
      ['10', '0.2', '0.2'],
    ]);
    expect(columns[1]?.meaning.kind).toBe('not-taken');
    expect(notes.map(({ where }) => where)).toEqual(['Row 4', 'Row 5', 'Column B']);
    expect(notes[0]?.detail).toContain('“top” is no crankshaft angle');
  });

  test('a lost decimal point is asked about by angle and lobe; the ramps are not', () => {
    const { cells } = read([
      HEAD,
      ...ROWS.map((row) => (row[0] === '120' ? ['120', '3.000', ''] : row)),
    ]);
    const asked = judgeCells(cells).filter(({ state }) => state !== 'ok');
    expect(asked.map(({ detail }) => detail)).toEqual([
      '120 deg, intake lobe lift: 3.000 in lies off the curve: before it 0.3200 in, after it 0.1900 in. Is the decimal point in its place?',
    ]);
    expect(judgeCells(read([HEAD, ...ROWS]).cells).every(({ state }) => state === 'ok')).toBe(true);
  });
});

describe('what it comes to', () => {
  const { cells } = read([HEAD, ...ROWS]);
  const readings = cells.map(({ position, quantity, axis, typed, unit }) => ({
    position,
    quantity,
    axis,
    value: { text: typed, unit },
  }));

  test('largest lift as written, and the duration at the lift that the rules name, exactly', () => {
    const checking = checkingLiftIn({ clauses: [duration('200')] });
    expect(checking?.text).toBe('0.050');
    const lobes = lobesOf(readings, checking);
    expect(
      lobes.map(({ lobe, largest, duration: found }) => [
        lobe,
        largest.lift.text,
        largest.degree.text,
        found?.value.text,
      ]),
    ).toEqual([
      ['intake', '0.3200', '100', '140'],
      ['exhaust', '0.3300', '480', '150'],
    ]);
  });

  test.each([
    ['two lifts in one datum', ['between 0.050 in and 0.200 in']],
    ['none', ['as the maker gives it']],
    ['two clauses that do not agree', ['at 0.050 in', 'at 0.006 in']],
  ])('no checking lift from %s', (_, datums) => {
    expect(checkingLiftIn({ clauses: datums.map((datum) => duration('200', datum)) })).toBe(
      undefined,
    );
  });

  test('the same lift in millimetres and in inches is one', () => {
    const clauses = [duration('200', 'at 1.27 mm'), duration('200', 'at 0.05 in')];
    expect(checkingLiftIn({ clauses })?.text).toBe('1.27');
  });

  test('each limit is held against every bore of the lobe: equal to it is within', () => {
    expect(stateOf(lift('0.3300'), cells)).toEqual({ state: 'within', outside: [] });
    const out = stateOf(lift('0.3299'), cells);
    expect(out.state).toBe('outside');
    expect(out.outside).toEqual(Array.from({ length: 8 }, () => 'exhaust'));
    expect(stateOf(duration('150'), cells).state).toBe('within');
    expect(stateOf(duration('149.9'), cells).outside?.length).toBe(8);
    expect(stateOf(duration('150', 'as the maker gives it'), cells).state).toBe('not-measured');
  });

  test('a bore that has a lift of its own on a cam card keeps it', () => {
    const clauses = [TABLE, lift('0.3300')];
    const form = paperworkForm({ clauses });
    const card = form.sheets.find(({ sheet }) => sheet === 'camshaft')!;
    const own = { position: '3 exhaust', quantity: 'lobe-lift', depth: '', axis: '' } as const;
    const draft = withCells(draftWith(cells), card.subject, [
      { ...own, typed: '0.3110', unit: 'in' },
    ]);
    const facts = declaredFacts(declare(draft, form, layout, []), { clauses });
    const lifts = facts.numbers.filter(({ quantity }) => quantity === 'lobe-lift');
    expect(lifts.length).toBe(16);
    expect(lifts.find(({ position }) => position === '3 exhaust')?.value.text).toBe('0.3110');
    expect(lifts.find(({ position }) => position === '5 exhaust')?.value.text).toBe('0.3300');
  });
});

describe('what is missing', () => {
  const form = formOf(TABLE, lift('0.3300'));
  const some = read([HEAD, ...ROWS.slice(0, 4)]).cells;

  test('a lobe without a curve, by its name', () => {
    expect(incompletePlaces(draftWith(some), form, layout)).toEqual([
      { position: 'exhaust lobe', lacks: ['lobe lift'] },
    ]);
    const { sheets } = stillMissing(
      draftWith(some),
      { clauses: [TABLE] },
      paperworkForm({ clauses: [TABLE] }),
      layout,
      [],
    );
    expect(sheets.map(({ values }) => values)).toEqual([1]);
  });

  test('by hand the rows are every ten degrees and what was typed between; of a file its own', () => {
    const keys = (written: Parameters<typeof sheetRows>[2]) =>
      sheetRows(form, layout, written).map(({ key }) => key);
    expect(keys([]).length).toBe(73);
    expect(keys([{ position: '15' }]).slice(0, 4)).toEqual(['0', '10', '15', '20']);
    expect(keys(some)).toEqual(['0', '20', '40', '60']);
  });
});
