import type { Page } from 'playwright-core';
import type { Visitor } from '../../support/browser';
import { runningSeason } from '../../support/season';

export const OFFICIAL = 'Ilse Törnkvist';
export const SECOND = 'Jory Vantreese';

/** Waits until the server has the draft as it stands on the screen. */
export const sent = (page: Page) => page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();

/** Waits until the editor answers to the hand. */
export const ready = (page: Page) =>
  page.locator('astro-island:not([ssr])').first().waitFor({ state: 'attached' });

/** A page that is left while its type still loads would count as a failed request. */
export const settled = (page: Page) => page.waitForLoadState('networkidle');

/** Adds a class to the demo series and opens its rulebook. */
export const openNewClass = async ({ page, open }: Visitor, name: string): Promise<string> => {
  await open('/office');
  await settled(page);
  await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
  const season = runningSeason(page);
  await season.getByLabel(/^New class in season/).fill(name);
  await season.getByRole('button', { name: 'Add the class' }).click();
  await page.getByRole('link', { name, exact: true }).click();
  await page.waitForURL(/\/office\/rulebooks\/[0-9a-f-]+$/);
  await settled(page);
  return new URL(page.url()).pathname;
};

export const startFrom = async ({ page, open }: Visitor, office: string, choice: string) => {
  await open(`${office}/start`);
  await page.getByLabel(choice).check();
  await page.getByRole('button', { name: 'Start writing' }).click();
  await page.waitForURL(/\/draft\//);
  await settled(page);
  await ready(page);
};

export interface Written {
  readonly heading: string;
  readonly words: string;
  readonly kind?: string;
  readonly fill?: (page: Page) => Promise<void>;
}

/** Writes a clause at the end of the rulebook, or one below the clause of this number. */
export const addClause = async (page: Page, under: string | undefined, clause: Written) => {
  if (under === undefined)
    await page.getByRole('button', { name: 'Add a clause', exact: true }).click();
  else {
    await page
      .locator('.clause-row')
      .filter({ has: page.getByText(under, { exact: true }) })
      .click();
    await page.getByRole('button', { name: `Add a clause below ${under}` }).click();
  }
  await page.getByLabel('Heading', { exact: true }).fill(clause.heading);
  await page.getByLabel('Words', { exact: true }).fill(clause.words);
  if (clause.kind !== undefined) {
    await page.getByLabel('Checked by').selectOption({ label: clause.kind });
    await page.getByLabel('Row of the penalty schedule').selectOption('A');
  }
  await clause.fill?.(page);
  await page.getByRole('button', { name: /^Close clause/ }).click();
};

/** The address of what everybody reads, from the class's page in the office. */
export const publicAddress = async (page: Page): Promise<string> => {
  const link = page.getByRole('link', { name: 'As everybody reads it' });
  const address = await link.getAttribute('href');
  if (address === null) throw new Error('The class has no public rulebook.');
  return address;
};

/** Publishes what stands in the editor, over the page to check it. */
export const publishFromEditor = async (page: Page, office: string) => {
  await settled(page);
  await page.getByRole('link', { name: 'Check before publishing' }).click();
  await settled(page);
  await page.getByRole('button', { name: /^Publish this (edition|bulletin) for/ }).click();
  await page.waitForURL(new RegExp(`${office}$`));
  await settled(page);
};

/** A new class whose first edition is a rule set, in force now. */
export const openClassInForce = async (official: Visitor, name: string, set = 'Tappets') => {
  const office = await openNewClass(official, name);
  await startFrom(official, office, `Rule set: ${set}`);
  await publishFromEditor(official.page, office);
  return { office, address: await publicAddress(official.page) };
};
