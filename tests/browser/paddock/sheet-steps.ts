import type { Locator, Page } from 'playwright-core';
import { readSheet as readXlsxRows } from 'read-excel-file/node';
import { expect } from 'vitest';
import type { Visitor } from '../../support/browser';
import { exactly, officePath } from './office-sheets';

export const TITLE = 'Lifter sheet, one row per bore';
export const SUBJECT = 'lifter-sheet';

const LABELS: Readonly<Record<string, string>> = {
  'lifter-body-diameter': 'Lifter body diameter',
  'tappet-bore-diameter': 'Tappet bore diameter',
  '': 'nothing for this sheet',
};

export const labelOf = (quantity: string): string => LABELS[quantity] ?? quantity;

/** New paperwork of a new engine, whose form answers to the hand. Gives its id. */
export const beginPaperwork = async (
  { page, open }: Visitor,
  about: { readonly className: string; readonly car: string; readonly engine: string },
): Promise<string> => {
  await open('/paddock/paperwork/new');
  const kind = page.getByLabel('Class', { exact: true });
  const wanted = kind.locator('option', { hasText: about.className });
  await kind.selectOption((await wanted.getAttribute('value')) ?? '');
  await page.getByLabel('Car number').fill(about.car);
  await page.locator('input[name="engine"][value="new"]').check();
  await page.getByLabel('Your name for it').fill(about.engine);
  await page.getByRole('button', { name: 'Begin the paperwork' }).click();
  await page.waitForURL(/\/paddock\/paperwork\/[0-9a-f-]{36}$/);
  await page.locator('[data-ready="yes"]').waitFor();
  return new URL(page.url()).pathname.split('/').at(-1) ?? '';
};

export const addSheets = (page: Page, files: readonly string[]): Promise<void> =>
  page
    .locator(`input[type="file"][aria-label="Add a sheet: ${TITLE}"]`)
    .setInputFiles(files.map(officePath));

export const previewOf = (page: Page, file: string): Locator =>
  page.getByRole('region', { name: `${file}, not confirmed yet` });

export const sheetSection = (page: Page): Locator =>
  page.getByRole('region', { name: TITLE, exact: true });

interface DraftCell {
  readonly position: string;
  readonly quantity: string;
  readonly typed: string;
  readonly unit: string;
  readonly source?: { readonly file: string; readonly cell: string; readonly held?: string };
}

/** What the server has of the sheet: what is on the screen only is not in it. */
export const keptCells = async (
  { page, context }: Visitor,
  paperworkId: string,
): Promise<readonly DraftCell[]> => {
  const url = new URL(`/api/paperwork/${paperworkId}/draft`, page.url());
  const answer = await context.request.get(url.href);
  const { draft } = (await answer.json()) as {
    draft: { sheets: readonly { subject: string; cells: readonly DraftCell[] }[] };
  };
  return draft.sheets.find(({ subject }) => subject === SUBJECT)?.cells ?? [];
};

/** Every filled cell of a grid as it stands on the screen: `3 intake, Lifter body diameter` and its number, exactly. */
export const shownIn = async (grid: Locator): Promise<Readonly<Record<string, string>>> => {
  const units = await grid.getByRole('columnheader').allTextContents();
  const cells = await grid.locator('input').evaluateAll((inputs) =>
    inputs.map((input) => ({
      name: input.getAttribute('aria-label') ?? '',
      typed: (input as HTMLInputElement).value,
    })),
  );
  return Object.fromEntries(
    cells
      .filter(({ typed }) => typed !== '')
      .map(({ name, typed }) => {
        const [, title = ''] = name.split(', ');
        const head = units.find((words) => words.startsWith(`${title} (`)) ?? '';
        return [name, exactly(typed, /\(([^)]+)\)$/.exec(head)?.[1] ?? '')];
      }),
  );
};

/** Says what the columns hold that nobody could know; those that say it themselves are not asked about. */
export const explainColumns = async (
  open: Locator,
  columns: Readonly<Record<string, { readonly quantity: string; readonly unit: string }>>,
): Promise<void> => {
  let left = Object.keys(columns).length;
  if (left > 0) await open.getByText(`${left} to say`).waitFor();
  for (const [heading, { quantity, unit }] of Object.entries(columns)) {
    await open.getByLabel(`${heading} holds`).selectOption({ label: labelOf(quantity) });
    left -= 1;
    await open.getByText(left === 0 ? 'all known' : `${left} to say`).waitFor();
    if (unit !== '')
      expect(await open.getByLabel(`Unit of ${heading}`, { exact: true }).inputValue()).toBe(unit);
  }
  await open.getByText('all known').waitFor();
};

/** Confirms, and waits until the server has it. */
export const confirmSheet = async (page: Page, open: Locator, count: number): Promise<void> => {
  await Promise.all([
    page.waitForResponse((response) => response.url().endsWith('/draft') && response.ok()),
    open.getByRole('button', { name: `Confirm these ${count} values` }).click(),
  ]);
  await open.waitFor({ state: 'detached' });
  await page
    .getByRole('status')
    .getByText(/^Sent \d\d:\d\d/)
    .waitFor();
};

/** The file given back, with the column that it did not have before; opened by a reader that is not the product's. */
export const correctedFile = async (page: Page, open: Locator, file: string) => {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    open.getByRole('link', { name: /with a column that says what to correct$/ }).click(),
  ]);
  const path = await download.path();
  const [name = '', ending = ''] = file.split('.');
  expect(download.suggestedFilename()).toBe(`${name} to correct.${ending}`);
  return { path, rows: ending === 'xlsx' ? await readXlsxRows(path) : undefined };
};
