import { readFileSync } from 'node:fs';
import type { Locator } from 'playwright-core';
import { expect, test } from 'vitest';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey, type Visitor } from '../../support/browser';
import { mailTo } from '../../support/product';
import { DESK, follow, OFFICIAL } from '../thread/story';
import { exactly, exactlyOf, expectedOf, OFFICE_FILES, placeIn } from './office-sheets';
import {
  addSheets,
  beginPaperwork,
  confirmSheet,
  correctedFile,
  explainColumns,
  keptCells,
  labelOf,
  previewOf,
  sheetSection,
  shownIn,
  TITLE,
} from './sheet-steps';
import { openClass } from './weekly-class';

const MINUTES = 60_000;
const BODY = 'lifter-body-diameter';
const BORE = 'tappet-bore-diameter';
const NOTHING = { quantity: '', unit: '' };

/** A cell that the sheet itself gets wrong or leaves out, and what a person types for it. */
interface Slip {
  readonly position: string;
  readonly value: string;
  /** What the screen says to do about it; absent where nothing stands in the cell. */
  readonly remedy?: string;
}

interface Shape {
  readonly file: string;
  readonly slip?: Slip;
  /** A hidden column is asked about too. */
  readonly hidden?: string;
}

const FORMULA = 'The formula in this cell failed: type the number here, or correct it in the file.';
const DATE = 'The spreadsheet made a date of what was typed: type the number here';
const NUMBER = 'Write one number with one decimal mark, such as 0.8441.';

/** All twelve, alternately as CSV and as XLSX. */
const SHAPES: readonly Shape[] = [
  { file: 'german.csv' },
  { file: 'merged-titles.xlsx' },
  { file: 'formulas.csv', slip: { position: '6 exhaust', value: '0.8439', remedy: FORMULA } },
  { file: 'units-in-cells.xlsx' },
  { file: 'across.csv' },
  { file: 'blanks.xlsx', slip: { position: '2 intake', value: '0.8439' } },
  { file: 'dates.csv', slip: { position: '3 intake', value: '0.8441', remedy: DATE } },
  { file: 'two-sheets.xlsx' },
  { file: 'other-order-utf16.csv' },
  { file: 'hidden.xlsx', hidden: 'Lifter before' },
  { file: 'formats.csv' },
  { file: 'text-numbers.xlsx', slip: { position: '7 exhaust', value: '0.8441', remedy: NUMBER } },
];

const CLAUSES = TAPPET_RULE_SET.clauses.filter(({ number }) =>
  ['4', '4.2', '4.6', '5', '5.2'].includes(number),
);

const nameOf = (position: string, quantity: string): string => `${position}, ${labelOf(quantity)}`;

/** What the form must hold in the end: the sheet's numbers, and the slip put right. */
const wantedOf = ({ file, slip }: Shape): Readonly<Record<string, string>> =>
  Object.fromEntries([
    ...expectedOf(file).cells.flatMap(({ position, quantity, value }) =>
      value === undefined ? [] : [[nameOf(position, quantity), exactlyOf(value)]],
    ),
    ...(slip === undefined ? [] : [[nameOf(slip.position, BORE), exactlyOf(`${slip.value} in`)]]),
  ]);

/** One word a bore: unreadable where a cell is no number, within where both are there. */
const marksOf = (file: string, positions: readonly string[]): readonly string[] => {
  const { cells } = expectedOf(file);
  return positions.map((position) => {
    const own = cells.filter((cell) => cell.position === position);
    if (own.some(({ value }) => value === undefined)) return `${position}, unreadable`;
    return own.length === 2 ? `${position}, within` : `${position}, not measured`;
  });
};

const mapOf = (open: Locator, file: string): Locator =>
  open.getByRole('group', { name: `${file} before it counts, front at the left` });

const gridOf = (open: Locator, file: string): Locator =>
  open.getByRole('grid', { name: `${TITLE}, as ${file} says` });

/** The cell that is no number: named, given back in the file with what to do, and put right on the screen. */
const putRight = async (page: Visitor['page'], open: Locator, { file, slip }: Shape) => {
  if (slip === undefined) return;
  const bad = expectedOf(file).cells.find(({ value }) => value === undefined);
  const cell = `${slip.position}, bore`;
  if (bad === undefined || slip.remedy === undefined) {
    await gridOf(open, file).getByLabel(nameOf(slip.position, BORE)).fill(slip.value);
    return;
  }
  const item = open.getByRole('listitem').filter({ hasText: bad.detail ?? '' });
  const words = (await item.textContent()) ?? '';
  expect(words).toContain(`${cell}: `);
  expect(words).toContain(slip.remedy);
  expect(words).toContain(`In ${placeIn(bad.cell, file)} (cell ${bad.cell}).`);

  const given = await correctedFile(page, open, file);
  const line = given.rows
    ? given.rows.map((row) => row.join('|')).find((row) => row.includes(`${bad.cell}: `))
    : readFileSync(given.path, 'utf8')
        .split(/\r?\n/)
        .find((row) => row.includes(`${bad.cell}: `));
  for (const part of [`${cell}: `, bad.detail, slip.remedy]) expect(line).toContain(part);
  const whole = given.rows?.map((row) => row.join('|')).join() ?? readFileSync(given.path, 'utf8');
  expect(whole).toContain('To correct (added by Tagwire)');

  await item.getByRole('button', { name: `Correct ${cell}` }).click();
  await open.getByLabel(new RegExp(`^${cell}, in `)).fill(slip.value);
  await open.getByRole('button', { name: 'Take this' }).click();
  await item.waitFor({ state: 'detached' });
};

/** One sheet, from the file to what the server has of it. */
const importShape = async (visitor: Visitor, paperworkId: string, shape: Shape) => {
  const { page } = visitor;
  const { file, slip, hidden } = shape;
  const { columns, notes, cells } = expectedOf(file);
  await addSheets(page, [file]);
  const open = previewOf(page, file);
  await open.getByText('none of them counts yet').waitFor();
  for (const where of notes) await open.getByText(`${where}:`, { exact: true }).waitFor();
  await explainColumns(open, { ...columns, ...(hidden && { [hidden]: NOTHING }) });
  await open.getByText(`${cells.length} values read, none of them counts yet.`).waitFor();

  const bores = await mapOf(open, file).getByRole('button').allTextContents();
  const positions = bores.map((words) => words.split(', ')[0] ?? '');
  expect(new Set(positions).size).toBe(16);
  expect(bores).toEqual(marksOf(file, positions));
  expect(await gridOf(open, file).getByRole('row').count()).toBe(17);
  await putRight(page, open, shape);
  const wanted = wantedOf(shape);
  expect(await shownIn(gridOf(open, file))).toEqual(wanted);
  expect(await keptCells(visitor, paperworkId)).toEqual([]);

  await confirmSheet(page, open, Object.keys(wanted).length);
  const kept = await keptCells(visitor, paperworkId);
  const numbers = kept.map(({ position, quantity, typed, unit }) => [
    nameOf(position, quantity),
    exactly(typed, unit),
  ]);
  expect(Object.fromEntries(numbers)).toEqual(wanted);
  const sources = kept.flatMap(({ position, quantity, source }) =>
    source === undefined ? [] : [[nameOf(position, quantity), `${source.cell} of ${source.file}`]],
  );
  expect(Object.fromEntries(sources)).toEqual(
    Object.fromEntries(
      cells.map((one) => [nameOf(one.position, one.quantity), `${one.cell} of ${file}`]),
    ),
  );
  const byHand = kept.filter(({ source }) => source === undefined || source.held !== undefined);
  expect(byHand.map(({ position, quantity }) => [position, quantity])).toEqual(
    slip === undefined ? [] : [[slip.position, BORE]],
  );

  await page.reload();
  await page.locator('[data-ready="yes"]').waitFor();
  const section = sheetSection(page);
  await section.getByText(`${cells.length} of its values count.`).waitFor();
  await section.getByText('Type or see all values').click();
  const grid = section.getByRole('grid', { name: TITLE, exact: true });
  expect(await shownIn(grid)).toEqual(wanted);
  const [last] = cells.filter(({ quantity, value }) => quantity === BODY && value).slice(-1);
  if (last === undefined) throw new Error(`Nothing is expected of ${file}.`);
  await grid.getByLabel(nameOf(last.position, BODY)).focus();
  await section.getByText(`From ${placeIn(last.cell, file)}.`).waitFor();
};

test('twelve messy shapes, as CSV and as XLSX: what each says ends in the paperwork, cell by cell; the second of a kind reads itself', {
  timeout: 5 * MINUTES,
}, async () => {
  await journey('messy shapes', async ({ enter }) => {
    const stamp = Date.now().toString(36);
    const className = `Sheet Eight ${stamp}`;
    const email = `sheets.${stamp}@example.org`;
    const official = await enter(DESK);
    await official.signInAs(OFFICIAL);
    await openClass(official, className, CLAUSES);
    await official.open('/office/people/corran-valley');
    await official.page.getByLabel('E-mail address', { exact: true }).fill(email);
    await official.page.getByLabel('As', { exact: true }).selectOption({ label: 'competitor' });
    await official.page.getByRole('button', { name: 'Send the invitation' }).click();

    // Somebody of whom no columns are remembered.
    const competitor = await enter(DESK);
    const { page } = competitor;
    await follow(competitor, (await mailTo(email, /invited as competitor/)).links);
    await page.getByLabel(/^Your name/).fill('Sorrel Wyndham');
    await page.getByRole('button', { name: 'Take part' }).click();
    await page.waitForURL(/\/paddock$/);
    for (const [at, shape] of SHAPES.entries()) {
      const engine = `SW ${at + 1} ${stamp}`;
      const about = { className, car: String(at + 1), engine };
      await importShape(competitor, await beginPaperwork(competitor, about), shape);
    }

    // The last one holds all that the class asks for: handed in, the officials read where each value came from.
    await page.getByRole('link', { name: 'Check and hand in' }).click();
    await page.getByRole('button', { name: 'Hand in version 1' }).click();
    await page.getByText(/^Version 1, ledger line/).waitFor();
    await official.open('/office/paperwork');
    await official.page
      .getByRole('row', { name: new RegExp(`SW ${SHAPES.length} ${stamp}`, 'i') })
      .getByRole('link')
      .click();
    await official.page.getByText('All values, and where each came from').click();
    const table = official.page.getByRole('table', { name: `${TITLE}: all values` });
    for (const { cell, position, value } of expectedOf('text-numbers.xlsx').cells) {
      const row = table.getByRole('row', { name: new RegExp(`^${position} `) });
      const words = (await row.textContent()) ?? '';
      expect(words).toContain(placeIn(cell, 'text-numbers.xlsx'));
      if (value === undefined) expect(words).toContain('held “0.84.39”, corrected by hand');
      else expect(words).toContain(value.replace(/^0/, ''));
    }

    // The other files of the same shapes, all at once: what was said about their headings is remembered.
    const others = OFFICE_FILES.filter((file) => SHAPES.every((shape) => shape.file !== file));
    expect(others.length).toBe(11);
    const paperworkId = await beginPaperwork(competitor, {
      className,
      car: '99',
      engine: `SW again ${stamp}`,
    });
    await addSheets(page, others);
    for (const file of others) {
      const open = previewOf(page, file);
      const { cells } = expectedOf(file);
      await open.getByText(`${cells.length} values read, none of them counts yet.`).waitFor();
      expect(await open.locator('summary').first().textContent()).toMatch(/hold: all known$/);
      expect(await shownIn(gridOf(open, file))).toMatchObject(wantedOf({ file }));
      await open.getByRole('button', { name: `Confirm these ${cells.length} values` }).waitFor();
    }
    expect(await keptCells(competitor, paperworkId)).toEqual([]);
  });
});
