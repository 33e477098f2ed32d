import { expect } from 'vitest';
import type { Visitor } from '../../support/browser';
import type { Upload } from './files';
import { LAYOUT } from './files';
import { here, look, type Story } from './story';

/** The form answers to the hand, and the server has all of it. */
const ready = async ({ page }: Visitor): Promise<void> => {
  await page.locator('[data-ready="yes"]').waitFor();
};
const saved = async ({ page }: Visitor): Promise<void> => {
  await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
};

const choose = async ({ page }: Visitor, button: RegExp, files: readonly Upload[]) => {
  const [chooser] = await Promise.all([
    page.waitForEvent('filechooser'),
    page
      .locator('button')
      .and(page.getByRole('button', { name: button }))
      .click(),
  ]);
  await chooser.setFiles([...files]);
};

/** Adds the engine and begins its paperwork. Gives its path. */
export const declareEngine = async (competitor: Visitor, story: Story): Promise<string> => {
  const { page } = competitor;
  await page.getByRole('link', { name: 'Declare an engine' }).click();
  const wanted = await page
    .getByLabel('Class', { exact: true })
    .locator('option', { hasText: story.className })
    .textContent();
  await page.getByLabel('Class', { exact: true }).selectOption({ label: wanted?.trim() ?? '' });
  await page.getByLabel('Car number').fill(story.car);
  await page.getByLabel('Your name for it').fill(story.engine);
  await page.getByLabel('Position map').selectOption({ label: LAYOUT.name });
  await page.getByLabel('Block casting number').fill(story.casting);
  await look(competitor, 'declare');
  await page.getByRole('button', { name: 'Begin the paperwork' }).click();
  await page.waitForURL(/\/paddock\/paperwork\/[0-9a-f-]{36}$/);
  await ready(competitor);
  return here(competitor);
};

/** Answers the questions in the rulebook's order, and finds the answers after a reload. */
export const answerQuestions = async (competitor: Visitor, story: Story): Promise<void> => {
  const { page } = competitor;
  await look(competitor, 'paperwork-empty');
  await page.getByLabel(/^Displacement/).fill('355.3');
  await page.getByLabel('Solid flat').check();
  await page
    .getByRole('group', { name: /bushed/ })
    .getByLabel('No')
    .check();
  await page.getByLabel('Anything they should know').fill('New lifters this winter.');
  await saved(competitor);
  await page.reload();
  await ready(competitor);
  const words = await page.locator('main').textContent();
  for (const typed of ['355.3', story.casting, 'Solid flat']) expect(words).toContain(typed);
  expect(await page.getByLabel('Anything they should know').inputValue()).toBe(
    'New lifters this winter.',
  );
};

/** Adds photographs; each is in when its picture is shown. */
export const addPhotographs = async (
  competitor: Visitor,
  pictures: readonly Upload[],
): Promise<void> => {
  const { page } = competitor;
  for (const picture of pictures) {
    await choose(competitor, /^(Photograph|Add another) ?: Photograph of the lifters/, [picture]);
    await page.getByRole('button', { name: `Take out ${picture.name}` }).waitFor();
  }
};

/** Adds the lifter sheet, finds the bad cell named, and corrects it in place. */
export const addSheet = async (competitor: Visitor, sheet: Upload): Promise<void> => {
  const { page } = competitor;
  await choose(competitor, /^Add a sheet ?: Lifter sheet/, [sheet]);
  await page.getByRole('button', { name: 'Confirm these 48 values' }).click();
  const bad = page.getByText('5 intake, lifter: “0.84.41” is no number. Kept as written.');
  await bad.waitFor();
  expect(await page.locator('main').textContent()).toContain(`column B of ${sheet.name}`);
  await look(competitor, 'sheet-bad-cell');
  await page
    .getByRole('region', { name: 'Lifter sheet, one row per bore' })
    .getByText('Type or see all values')
    .click();
  const table = page.getByRole('grid', { name: 'Lifter sheet, one row per bore', exact: true });
  expect(await table.getByRole('row').count()).toBe(17);
  await page.getByRole('button', { name: 'Correct 5 intake, lifter' }).click();
  await page.getByLabel('5 intake, lifter, in in').fill('0.8424');
  await page.getByRole('button', { name: 'Take this' }).click();
};

/** Adds the cam card, which is in order. */
export const addCamCard = async (competitor: Visitor, card: Upload): Promise<void> => {
  const { page } = competitor;
  await choose(competitor, /^Add a sheet ?: Cam card/, [card]);
  await page.getByRole('button', { name: 'Confirm these 16 values' }).click();
};

/** Reads the check against every clause, and hands in. Gives the hash on the receipt. */
export const handIn = async (competitor: Visitor, version: number): Promise<string> => {
  const { page } = competitor;
  await saved(competitor);
  await page.getByRole('link', { name: 'Check and hand in' }).click();
  await page.getByRole('heading', { name: 'Check before handing in' }).waitFor();
  const words = await page.locator('main').textContent();
  for (const clause of ['3.1', '4.1', '4.2', '4.3', '4.4', '4.5', '4.6', '5.1', '5.2'])
    expect(words).toContain(clause);
  expect(words).toContain('Acceptance is not approval of the engine.');
  await look(competitor, `hand-in-${version}`);
  await page.getByRole('button', { name: `Hand in version ${version}` }).click();
  await page.getByText(/^Version \d+, ledger line \d+, SHA-256/).waitFor();
  await look(competitor, `handed-in-${version}`);
  const receipt = await page.getByText(/^Version \d+, ledger line \d+, SHA-256/).textContent();
  return /[0-9a-f]{64}/.exec(receipt ?? '')?.[0] ?? '';
};
