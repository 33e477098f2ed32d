import pg from 'pg';
import { expect } from 'vitest';
import type { Visitor } from '../../support/browser';
import { readProduct } from '../../support/product';
import { eventually } from '../../support/wait';
import type { Upload } from './files';
import { INSPECTOR, look, type Story, WITNESS } from './story';

const inspectionPage = (id: string): string => `/barn/inspections/${id}`;

/** The chief names the inspector and the bay. Gives the inspection. */
export const nameInspector = async (chief: Visitor, story: Story): Promise<string> => {
  const { page, open } = chief;
  await open('/barn');
  await look(chief, 'barn');
  await page
    .getByRole('row', { name: new RegExp(story.className) })
    .getByRole('link', { name: 'Name an inspector' })
    .click();
  const inspectors = page.getByLabel('Inspector', { exact: true });
  const person = await inspectors.locator('option', { hasText: INSPECTOR }).getAttribute('value');
  await inspectors.selectOption(person);
  await page.getByLabel('Bay').fill('2');
  await look(chief, 'assign');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await page.waitForLoadState();
  expect(await page.getByLabel('Bay').inputValue()).toBe('2');
  return new URL(page.url()).pathname.split('/').at(-1) ?? '';
};

/** Reads what is asked before the first bolt, and opens. */
export const openInspection = async (inspector: Visitor, story: Story): Promise<void> => {
  const { page, open } = inspector;
  await open('/barn');
  await page
    .getByRole('row', { name: new RegExp(story.className) })
    .getByRole('link', { name: /^Go to it/ })
    .click();
  await page.getByRole('heading', { name: 'Before the first bolt' }).waitFor();
  const words = await page.locator('main').textContent();
  expect(words).toContain('eye protection');
  expect(words).toContain('4.3');
  await look(inspector, 'before-the-first-bolt');
  await page.getByRole('button', { name: 'Open the inspection' }).click();
  await page.waitForURL(/\/measure$/);
};

const saved = async ({ page }: Visitor): Promise<void> => {
  await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
};

const part = ({ page }: Visitor, name: string) =>
  page.getByRole('navigation', { name: 'What is read' }).getByRole('button', { name }).click();

/** Keys as they are tapped, then Enter; waits until the number stands where it belongs. */
const enter = async (
  { page }: Visitor,
  keys: string,
  taken: { readonly cell: string; readonly shown: string },
): Promise<void> => {
  const pad = page.getByRole('region', { name: 'Keypad' });
  for (const key of keys) {
    await pad
      .getByRole('button', { name: key === '-' ? 'Change the sign' : key, exact: true })
      .click();
  }
  await pad.getByRole('button', { name: /^Enter/ }).click();
  await page.getByRole('button', { name: `${taken.cell}: ${taken.shown}`, exact: true }).waitFor();
};

const bore = ({ page }: Visitor, name: string) =>
  page.locator('.only-wide').getByRole('button', { name: new RegExp(`^${name},`) });

/** The checks without numbers, for the engine and for this bore. */
const check = async (inspector: Visitor, story: Story): Promise<void> => {
  const { page } = inspector;
  await part(inspector, 'Checks');
  await page.getByLabel('As found').fill(story.casting);
  await page.getByRole('button', { name: 'Keep' }).click();
  await page.getByRole('button', { name: 'Solid flat' }).click();
  await page
    .getByRole('group', { name: /bushed/ })
    .getByRole('button', { name: 'No', exact: true })
    .click();
  await page.locator('[aria-pressed="true"]').nth(1).waitFor();
  await look(inspector, 'checks');
};

/** Every place in full, whatever the plan asks. */
const readInFull = async ({ page }: Visitor): Promise<void> => {
  await page.getByRole('button', { name: 'More' }).click();
  await page.getByRole('button', { name: /^Set up/ }).click();
  await page.getByLabel('How much').selectOption('full');
  await page.getByRole('button', { name: 'Back' }).click();
  await page.getByRole('button', { name: 'Back' }).click();
};

/** One bore in full: checks, lifter, an oversize foot, the bore against the ring between two zeros. */
export const measureBore = async (
  inspector: Visitor,
  story: Story,
  picture: Upload,
): Promise<void> => {
  const { page } = inspector;
  await bore(inspector, '3 exhaust').click();
  await check(inspector, story);

  await part(inspector, 'Lifter');
  await readInFull(inspector);
  await enter(inspector, '8423', { cell: 'Body, upper, Along', shown: '0.8423' });
  await enter(inspector, '8432', { cell: 'Body, upper, Across', shown: '0.8432' });
  await page.getByRole('button', { name: 'Strike last reading' }).click();
  await page.getByText('It stays on record, with the reason.').waitFor();
  await page.getByRole('button', { name: 'Written wrong' }).click();
  await page.getByRole('button', { name: 'Body, upper, Across: empty' }).waitFor();
  await enter(inspector, '8423', { cell: 'Body, upper, Across', shown: '0.8423' });
  await enter(inspector, '8422', { cell: 'Body, lower, Along', shown: '0.8422' });
  await enter(inspector, '8423', { cell: 'Body, lower, Across', shown: '0.8423' });
  await look(inspector, 'lifter');

  await part(inspector, 'Foot');
  await enter(inspector, '8452', { cell: 'Foot, Along', shown: '0.8452' });
  await enter(inspector, '8450', { cell: 'Foot, Across', shown: '0.8450' });
  await page.getByText('Outside', { exact: true }).waitFor();
  await look(inspector, 'foot');

  await part(inspector, 'Bore');
  const pad = page.getByRole('region', { name: 'Keypad' });
  await pad.getByRole('button', { name: '0', exact: true }).click();
  await pad.getByRole('button', { name: 'Enter opening zero' }).click();
  await enter(inspector, '-1', { cell: 'Above the gallery, Along', shown: '−0.1' });
  await enter(inspector, '0', { cell: 'Above the gallery, Across', shown: '0.0' });
  await saved(inspector);
  await page.reload();
  await page.getByRole('button', { name: 'Above the gallery, Along: −0.1', exact: true }).waitFor();
  await part(inspector, 'Lifter');
  for (const [cell, shown] of [
    ['Body, upper, Along', '0.8423'],
    ['Body, upper, Across', '0.8423'],
    ['Body, lower, Along', '0.8422'],
    ['Body, lower, Across', '0.8423'],
  ] as const)
    await page.getByRole('button', { name: `${cell}: ${shown}`, exact: true }).waitFor();
  await part(inspector, 'Bore');
  await enter(inspector, '1', { cell: 'Below the gallery, Along', shown: '+0.1' });
  await enter(inspector, '2', { cell: 'Below the gallery, Across', shown: '+0.2' });
  await page.getByRole('button', { name: 'Take the closing zero' }).click();
  await page.getByText('Closing zero', { exact: true }).waitFor();
  await pad.getByRole('button', { name: '1', exact: true }).click();
  await pad.getByRole('button', { name: /^Enter/ }).click();
  await page.getByRole('img', { name: /closing zero 0\.1/ }).waitFor();
  await page.getByText('The zero held').waitFor();
  await pad.getByRole('button', { name: 'Enter zero seen' }).click();
  // Ring 0.8440 in, dial −0.1 to +0.2 less its share of 0.1 of drift, lifter 0.842275 in: 1.725
  // thousandths, shown to one place more than the dial's division.
  await page.getByText(/1\.72 ± /).waitFor();
  await look(inspector, 'bore');

  await page.getByLabel(/^Photograph/).setInputFiles(picture);
  await page.getByText('3 exhaust: 1').waitFor();
  await saved(inspector);
};

/** Sets the clock of this person's sign-ins back, as if they had begun earlier in the evening. */
const ageSignIns = async (email: string, minutes: number): Promise<void> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  try {
    await client.query(
      `update public.session set authenticated_at = authenticated_at - make_interval(mins => $2)
       where person_id = (select id from public.person where email = $1)`,
      [email, minutes],
    );
  } finally {
    await client.end();
  }
};

/** The witness signs; the inspector signs in once more, and signs. */
export const signReport = async (inspector: Visitor, inspectionId: string): Promise<void> => {
  const { page, open } = inspector;
  await ageSignIns('oona.brannick@example.org', 20);
  await open(inspectionPage(inspectionId));
  await page.getByLabel('Name of the competitor’s representative').fill(WITNESS);
  await page.getByRole('button', { name: 'I have seen the findings: sign' }).click();
  await page.getByText(`${WITNESS} has seen the findings and signed`).waitFor();
  expect(await page.getByRole('button', { name: 'Sign the report and close' }).count()).toBe(0);
  await page.getByText('All of them, in taking order').click();
  const struck = page.getByRole('row', { name: /struck: written wrong/ });
  expect(await struck.textContent()).toContain('0.8432 in');
  await page.getByText('1 taken', { exact: true }).click();
  const picture = page.getByRole('img', { name: 'Photograph of 3 exhaust' });
  await picture.scrollIntoViewIfNeeded();
  await eventually('the photograph of the bore', async () =>
    (await picture.evaluate((shown: HTMLImageElement) => shown.naturalWidth)) > 0
      ? true
      : undefined,
  );
  await look(inspector, 'findings');
  await signAgain(inspector);
  await drawStrokes(inspector);
  await page.getByRole('button', { name: 'Sign the report and close' }).click();
  await page.getByText(/^Revision 1, signed/).waitFor();
  await page
    .getByRole('img', { name: `Pen strokes of ${INSPECTOR}, beside the signature` })
    .waitFor();
  await look(inspector, 'signed');
};

/** Draws on the pad, clears it, and draws two strokes again. */
const drawStrokes = async (inspector: Visitor): Promise<void> => {
  const { page } = inspector;
  const pad = page.getByRole('img', { name: /^Signature pad/ });
  await pad.scrollIntoViewIfNeeded();
  const box = await pad.boundingBox();
  if (box === null) throw new Error('There is no pad to sign on.');
  const stroke = async (points: readonly (readonly [number, number])[]) => {
    for (const [at, [x, y]] of points.entries()) {
      await page.mouse.move(box.x + box.width * x, box.y + box.height * y);
      if (at === 0) await page.mouse.down();
    }
    await page.mouse.up();
  };
  await stroke([
    [0.2, 0.2],
    [0.8, 0.2],
  ]);
  await page.getByRole('img', { name: 'Signature pad, 1 stroke drawn' }).waitFor();
  await page.getByRole('button', { name: 'Clear the pad' }).click();
  await page.getByRole('img', { name: 'Signature pad, empty' }).waitFor();
  await stroke([
    [0.1, 0.7],
    [0.15, 0.3],
    [0.2, 0.7],
    [0.25, 0.3],
    [0.3, 0.7],
    [0.4, 0.5],
  ]);
  await stroke([
    [0.5, 0.6],
    [0.55, 0.4],
    [0.6, 0.6],
    [0.75, 0.55],
  ]);
  await page.getByRole('img', { name: 'Signature pad, 2 strokes drawn' }).waitFor();
  await look(inspector, 'strokes');
};

const signAgain = async ({ page }: Visitor): Promise<void> => {
  await page.getByRole('link', { name: 'Sign in once more' }).click();
  await page.getByRole('button', { name: INSPECTOR }).click();
  await page.waitForURL(/\/barn\/inspections\//);
};

/** Opens a correction with its reason, reads the foot once more, and signs revision 2. */
export const correctReport = async (
  inspector: Visitor,
  inspectionId: string,
  reason: string,
): Promise<void> => {
  const { page, open } = inspector;
  await open(inspectionPage(inspectionId));
  await page.getByText('Correct this report').click();
  await page.getByLabel('Why it is corrected').fill(reason);
  await page.getByRole('button', { name: 'Open a correction' }).click();
  await page.getByRole('link', { name: 'Measure' }).click();
  await page.waitForURL(/\/measure$/);
  await bore(inspector, '3 exhaust').click();
  await part(inspector, 'Foot');
  await page.getByRole('button', { name: 'Foot, Across: 0.8450', exact: true }).click();
  await enter(inspector, '8451', { cell: 'Foot, Across', shown: '0.8451' });
  await saved(inspector);
  await open(inspectionPage(inspectionId));
  await look(inspector, 'correcting');
  await page.getByRole('button', { name: 'Sign the correction' }).click();
  await page.getByText(/^Revision 2, signed/).waitFor();
  expect(await page.locator('main').textContent()).toContain(reason);
  for (const revision of [1, 2]) {
    await page.getByText(`Findings of revision ${revision}`).click();
    await page.getByText(new RegExp(`^Revision ${revision}, signed`)).waitFor();
  }
  await look(inspector, 'corrected');
};
