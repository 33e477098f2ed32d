import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { Locator, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { readSheetRows } from '@/services/paperwork/sheet/read-sheet-rows';
import { writeZip } from '@/services/paperwork/sheet/xlsx/write-zip';
import { journey, type Visitor } from '../support/browser';

const MINUTES = 60_000;
const PHONE = { viewport: { width: 390, height: 844 }, touch: true };
const TITLE = 'Lifter sheet, one row per bore';

const fixture = (name: string): Buffer =>
  readFileSync(fileURLToPath(new URL(`../fixtures/office/${name}`, import.meta.url)));

const CSV = 'text/csv';
const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

/** New paperwork with an engine of its own. */
const begin = async (visitor: Visitor, reference: string): Promise<void> => {
  const { page } = visitor;
  await visitor.open('/paddock/paperwork/new');
  const kind = page.getByLabel('Class', { exact: true });
  const wanted = kind.locator('option', { hasText: 'Street Eight' }).first();
  await kind.selectOption((await wanted.getAttribute('value')) ?? '');
  await page.getByLabel('Car number').fill('77');
  await page.locator('input[name="engine"][value="new"]').check();
  await page.getByLabel('Your name for it').fill(`${reference} ${Date.now().toString(36)}`);
  await page.getByRole('button', { name: 'Begin the paperwork' }).click();
  await page.waitForURL(/\/paddock\/paperwork\/[0-9a-f-]{36}$/);
  await page.locator('[data-ready="yes"]').waitFor();
};

const add = async (page: Page, name: string, mimeType: string, buffer: Buffer): Promise<void> => {
  await page
    .locator('input[type="file"][aria-label^="Add a sheet: Lifter sheet"]')
    .setInputFiles([{ name, mimeType, buffer }]);
};

const preview = (page: Page, name: string) =>
  page.getByRole('region', { name: `${name}, not confirmed yet` });

const section = (page: Page) => page.getByRole('region', { name: TITLE, exact: true });

/** Confirms, and waits until the server has the draft with these values. */
const confirm = async (page: Page, open: Locator, name: string): Promise<void> => {
  const button = open.getByRole('button', { name });
  await button.waitFor();
  await Promise.all([
    page.waitForResponse((response) => response.url().endsWith('/draft') && response.ok()),
    button.click(),
  ]);
  await page
    .getByRole('status')
    .getByText(/^Sent \d\d:\d\d/)
    .waitFor();
};

test(
  'a German sheet: its columns are explained once, a bad cell is put right, and it is confirmed',
  async () => {
    const bad = Buffer.from(
      fixture('german.csv').toString('latin1').replace('21,440', '21.44.0'),
      'latin1',
    );
    await journey('german sheet', async ({ enter }) => {
      const builder = await enter(PHONE);
      const { page } = builder;
      await builder.signInAs('Wren Halloway');
      await begin(builder, 'German');
      await add(page, 'Stößel.csv', CSV, bad);
      const open = preview(page, 'Stößel.csv');
      await open.getByText('3 to say').waitFor();
      expect(await open.textContent()).toContain('21,392 · 21,394 · 21,397');
      await builder.shot('sheet-columns-phone');
      await builder.expectAccessible();
      await builder.expectNoSidewaysScroll();
      const say = async (heading: string, option: string) => {
        await open.getByLabel(`${heading} holds`).selectOption({ label: option });
      };
      await say('Prüfer', 'nothing for this sheet');
      await open.getByText('2 to say').waitFor();
      await say('Stößel Ø [mm]', 'Lifter body diameter');
      await open.getByText('1 to say').waitFor();
      expect(await open.getByLabel('Unit of Stößel Ø [mm]').inputValue()).toBe('mm');
      await say('Führung Ø [mm]', 'Tappet bore diameter');
      await open.getByText('all known').waitFor();
      await open
        .getByText('3 intake, bore: “21.44.0” is no number. Kept as written.')
        .first()
        .waitFor();
      expect(await open.textContent()).toContain('row 4, column C of Stößel.csv (cell C4)');
      await builder.shot('sheet-preview-phone');
      await builder.expectAccessible();
      await builder.expectNoSidewaysScroll();

      const grid = open.getByRole('grid', { name: `${TITLE}, as Stößel.csv says` });
      expect(await grid.getByRole('row').count()).toBe(17);
      const cell = grid.getByLabel('3 intake, Tappet bore diameter');
      await open.getByRole('button', { name: /^3 intake/ }).click();
      expect(await cell.evaluate((input) => input === document.activeElement)).toBe(true);
      await page.keyboard.type('21.44x');
      await page.keyboard.press('Escape');
      expect(await cell.inputValue()).toBe('21.44.0');
      await page.keyboard.press('ArrowDown');
      await page.keyboard.press('ArrowUp');
      await page.keyboard.type('21,440');
      await page.keyboard.press('Enter');
      const below = grid.getByLabel('3 exhaust, Tappet bore diameter');
      expect(await below.evaluate((input) => input === document.activeElement)).toBe(true);
      await page.keyboard.press('Home');
      await page.keyboard.press('F2');
      await page.keyboard.press('ArrowLeft');
      const first = grid.getByLabel('3 exhaust, Lifter body diameter');
      expect(await first.evaluate((input) => input === document.activeElement)).toBe(true);
      await page.keyboard.press('Escape');

      expect(await section(page).textContent()).toContain('none of them counts yet');
      await confirm(page, open, 'Confirm these 32 values');
      await open.waitFor({ state: 'detached' });
      await section(page).getByText('32 of its values count.').waitFor();
      await page.reload();
      await page.locator('[data-ready="yes"]').waitFor();
      await section(page).getByText('Type or see all values').click();
      const kept = section(page).getByLabel('3 intake, Tappet bore diameter');
      expect(await kept.inputValue()).toBe('21,440');
      await kept.focus();
      await section(page)
        .getByText('From row 4, column C of Stößel.csv, which held “21.44.0”.')
        .waitFor();
      await builder.shot('sheet-confirmed-phone');

      await add(page, 'again.csv', CSV, fixture('german.csv'));
      const again = preview(page, 'again.csv');
      await again.getByText('What the columns hold: all known').waitFor();
      await again.getByRole('button', { name: 'Confirm these 32 values' }).waitFor();
    });
  },
  4 * MINUTES,
);

test(
  'a workbook of LibreOffice: taken back with a column of errors, put right, and confirmed',
  async () => {
    await journey('workbook of errors', async ({ enter }) => {
      const competitor = await enter();
      const { page } = competitor;
      await competitor.signInAs('Wren Halloway');
      await begin(competitor, 'Workbook');
      await add(page, 'formulas.xlsx', XLSX, fixture('formulas.xlsx'));
      const open = preview(page, 'formulas.xlsx');
      await open
        .getByText('6 exhaust, bore: “#DIV/0!” is no number. Kept as written.')
        .first()
        .waitFor();
      expect(await open.textContent()).toContain('Row 18: “Average” is no bore of this engine.');
      await open.getByLabel('Clearance holds').selectOption('not-taken');
      await competitor.shot('sheet-preview');
      await competitor.expectAccessible();
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        open.getByRole('link', { name: /with a column that says what to correct$/ }).click(),
      ]);
      expect(download.suggestedFilename()).toBe('formulas to correct.xlsx');
      const given = readFileSync(await download.path());
      const read = await readSheetRows(given);
      if (!read.ok) throw new Error(read.failure.detail);
      const [grid] = read.value.grids;
      expect(grid?.rows[0]?.at(-1)).toBe('To correct (added by Tagwire)');
      const said = grid?.rows.flatMap((row) => row[4] ?? '').filter((words) => words !== '');
      expect(said).toEqual([
        'To correct (added by Tagwire)',
        expect.stringMatching(/^D\d+: 6 exhaust, bore: “#DIV\/0!” is no number\./),
        expect.stringMatching(/^Row 18: “Average” is no bore/),
      ]);
      expect(grid?.rows[1]?.slice(0, 4)).toEqual(['1 exhaust', '0.8422', '0.0015', '0.8437']);

      await add(page, 'corrected.xlsx', XLSX, await corrected(given));
      const again = preview(page, 'corrected.xlsx');
      await again.getByRole('button', { name: 'Confirm these 32 values' }).waitFor();
      expect(await again.textContent()).not.toContain('DIV');
      expect(await again.textContent()).toContain('all known');
      await confirm(page, again, 'Confirm these 32 values');
      await section(page).getByText('32 of its values count.').waitFor();
      await competitor.shot('sheet-confirmed');
    });
  },
  4 * MINUTES,
);

/** As a person would: the failing formula is typed over with its number; the column of errors stays. */
const corrected = async (given: Buffer): Promise<Buffer> => {
  const { openPackage } = await import('@/services/paperwork/sheet/xlsx/open-package');
  const { nothingSpent } = await import('@/services/paperwork/sheet/spent');
  const file = openPackage(given, nothingSpent());
  if (!file.ok) throw new Error(file.failure.detail);
  const part = 'xl/worksheets/sheet1.xml';
  const xml = file.value.read(part);
  if (!xml.ok) throw new Error(xml.failure.detail);
  const text = xml.value.replace(/<c([^>]*)t="e"([^>]*)>.*?<\/c>/, '<c$1$2><v>0.8441</v></c>');
  return writeZip(
    file.value.entries.map((entry) =>
      entry.name === part ? { name: part, text } : { name: entry.name, from: given, entry },
    ),
  );
};
