import type { Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { journey } from '../../support/browser';
import { eventually } from '../../support/wait';
import { CLAUSES } from './demo-class';
import {
  addClause,
  OFFICIAL,
  openClassInForce,
  openNewClass,
  ready,
  SECOND,
  sent,
  settled,
  startFrom,
} from './steps';

/** Midnight after the clocks of the demo series' zone went forward next year: second Sunday of March. */
const springDay = (): string => {
  const year = new Date().getFullYear() + 1;
  const first = new Date(Date.UTC(year, 2, 1)).getUTCDay();
  return `${year}-03-${String(((7 - first) % 7) + 8).padStart(2, '0')}`;
};

test('an official writes the demo class from empty, publishes it and amends it across midnight', async () => {
  await journey('rulebook from empty', async ({ enter }) => {
    const official = await enter();
    const { page } = official;
    await official.signInAs(OFFICIAL);
    const name = `Street Six ${Date.now().toString(36)}`;
    const office = await openNewClass(official, name);
    await startFrom(official, office, 'Nothing');

    await page.getByRole('button', { name: 'Edit the schedule' }).click();
    await page.getByRole('button', { name: 'Add a row' }).click();
    await page.getByLabel('Name', { exact: true }).fill('A');
    await page.getByLabel('For which breaches').fill('A part that can improve performance');
    await page.getByLabel('First breach').fill('Loss of the result');
    await page.getByRole('button', { name: 'Add a step' }).click();
    await page.getByLabel('Breach 2').fill('Loss of the season’s points');
    await page.getByLabel('Breaches count on into the next season').check();
    for (const clause of CLAUSES) await addClause(page, clause.under, clause);

    // The lift has no datum yet: the fault says so and leads to the field.
    const fault = page.getByRole('button', { name: /2\.4 Valve lift needs its datum/ });
    await fault.click();
    await eventually('the datum under the cursor', async () =>
      (await page.getByLabel('Datum').evaluate((field) => field === document.activeElement))
        ? true
        : undefined,
    );
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await sent(page);
    await settled(page);
    await page.getByRole('link', { name: 'Check before publishing' }).click();
    await settled(page);
    await page.getByRole('heading', { name: 'Still ambiguous: 1' }).waitFor();
    expect(await page.getByRole('button', { name: /^Publish/ }).count()).toBe(0);
    await page.getByRole('link', { name: 'Back to writing' }).click();
    await ready(page);
    await page.locator('.clause-row', { hasText: 'Valve lift' }).click();
    await page.getByLabel('Datum').fill('at the valve spring retainer');
    await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
    await sent(page);
    await official.shot('rulebook-editor');

    await settled(page);
    await page.getByRole('link', { name: 'Check before publishing' }).click();
    await settled(page);
    await official.expectAccessible();
    await page.getByRole('button', { name: `Publish this edition for ${name}` }).click();
    await page.waitForURL(new RegExp(`${office}$`));
    await page.getByRole('rowheader', { name: 'Edition 1' }).waitFor();

    await page.getByRole('button', { name: 'Write a bulletin' }).click();
    await page.waitForURL(/\/draft\//);
    await ready(page);
    await page.getByLabel('Title').fill('Less lift');
    await page.getByLabel('Reason').fill('Springs bind.');
    await page.getByLabel('It counts').selectOption('instant');
    const day = springDay();
    const from = page.getByRole('textbox', { name: 'From' });
    await from.fill(`${day} 00:00`);
    await from.press('Enter');
    await page.getByLabel('Clause in force').selectOption('2.4');
    await page.getByRole('button', { name: 'Change this clause' }).click();
    await page.getByLabel('Words', { exact: true }).fill('Valve lift is at most 0.4500 in.');
    await page.getByRole('textbox', { name: 'At most', exact: true }).fill('0.4500');
    await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
    await sent(page);
    await official.expectAccessible();
    await settled(page);
    await page.getByRole('link', { name: 'Check before publishing' }).click();
    await settled(page);
    await page.getByRole('heading', { name: 'Tried on accepted engines' }).waitFor();
    await page.getByRole('heading', { name: 'Tried on past findings' }).waitFor();
    await page.getByRole('button', { name: `Publish this bulletin for ${name}` }).click();
    await page.getByRole('rowheader', { name: 'Bulletin 1' }).waitFor();
    const address = await page
      .getByRole('link', { name: 'As everybody reads it' })
      .getAttribute('href');

    const reader = await enter({ viewport: { width: 390, height: 800 } });
    const read = async (path: string) => {
      await reader.open(`${address}${path}`);
      await settled(reader.page);
    };
    const before = new Date(`${day}T00:00:00Z`);
    before.setUTCDate(before.getUTCDate() - 1);
    const eve = `${before.toISOString().slice(0, 10)}T23:59`;
    for (const [on, lift] of [
      [eve, '0.4800 in'],
      [day, '0.4500 in'],
    ]) {
      await read(`?on=${on}`);
      expect(await reader.page.locator('[id="2.4"]').textContent()).toContain(`at most ${lift}`);
    }
    expect(await reader.page.locator('script').count()).toBe(0);
    await reader.expectNoSidewaysScroll();
    await reader.expectAccessible();
    await read(`/changes?from=${eve}&to=${day}`);
    expect(await reader.page.locator('main').textContent()).toContain('0.4500 in');
    await reader.expectAccessible();
    await read(`/clauses/2.4?on=${day}`);
    await reader.page.getByRole('img', { name: 'Address of clause 2.4' }).waitFor();
    await reader.expectAccessible();
    await read('');
    const whole = (await reader.page.locator('main').textContent()) ?? '';
    for (const { heading } of CLAUSES) expect(whole).toContain(heading);
    for (const words of [
      'Judged by the officials.',
      'what most builders do',
      'Loss of the result; then Loss of the season’s points. Counts on into the next season.',
      'A 0.8450 in gauge must not pass each lifter bore',
      'of the mean of at least 3 reference parts',
      'intake bolts',
    ]) {
      expect(whole).toContain(words);
    }
    expect(await reader.page.locator('[id="3.7"] a[href$="#2.2"]').count()).toBe(1);
    await read(`?find=bushed`);
    expect(await reader.page.locator('article.rule').count()).toBe(1);
  });
});

test('two officials on one draft choose, clause by clause, what stays', async () => {
  await journey('two officials on one draft', async ({ enter }) => {
    const one = await enter();
    const two = await enter();
    await one.signInAs(OFFICIAL);
    await two.signInAs(SECOND);
    const office = await openNewClass(one, `Street Five ${Date.now().toString(36)}`);
    await startFrom(one, office, 'Rule set: Weights');
    await two.open(new URL(one.page.url()).pathname);
    await ready(two.page);

    const edit = async (page: Page, heading: string, words: string) => {
      await page.locator('.clause-row', { hasText: heading }).first().click();
      await page.getByLabel('Words', { exact: true }).fill(words);
    };
    await edit(one.page, 'Crankshaft', 'The crankshaft weighs at least 50.0 lb, bare.');
    await sent(one.page);
    await edit(one.page, 'Lifters', 'Each lifter weighs at least 82.0 g.');
    await sent(one.page);

    two.expectRefusal({ url: /\/api\/rulebooks\/drafts\//, status: 412 });
    await edit(two.page, 'Crankshaft', 'A bare crankshaft weighs 50.0 lb or more.');
    await two.page.getByRole('heading', { name: /Ilse Törnkvist saved this draft/ }).waitFor();
    await two.expectAccessible();
    await two.shot('rulebook-choice');
    const goOn = two.page.getByRole('button', { name: 'Go on with these' });
    expect(await goOn.isDisabled()).toBe(true);
    await two.page
      .getByRole('group', { name: /Clause 3\.1: you both changed it/ })
      .getByRole('radio', { name: /^Yours/ })
      .check();
    await goOn.click();
    await sent(two.page);

    await one.page.reload();
    await ready(one.page);
    await one.page.locator('.clause-row', { hasText: 'Crankshaft' }).click();
    expect(await one.page.getByLabel('Words', { exact: true }).inputValue()).toBe(
      'A bare crankshaft weighs 50.0 lb or more.',
    );
    await one.page.locator('.clause-row', { hasText: 'Lifters' }).click();
    expect(await one.page.getByLabel('Words', { exact: true }).inputValue()).toBe(
      'Each lifter weighs at least 82.0 g.',
    );
  });
});

test('an official copies last season’s rulebook and changes one limit', async () => {
  await journey('copy of last season', async ({ enter }) => {
    const official = await enter();
    const { page } = official;
    await official.signInAs(OFFICIAL);
    const stamp = Date.now().toString(36);
    const name = `Copied ${stamp}`;
    await openClassInForce(official, name);

    await official.open('/office');
    await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
    const year = new Date().getFullYear() + 1;
    const season = `${year} ${stamp}`;
    await page.getByLabel('Name', { exact: true }).fill(season);
    await page.getByLabel('First day').fill(`${year}-01-01`);
    await page.getByLabel('Last day').fill(`${year}-12-31`);
    await page.getByRole('button', { name: 'Open the season' }).click();
    const next = page.locator('section', {
      has: page.getByRole('heading', { name: `Season ${season}` }),
    });
    await next.getByLabel(`New class in season ${season}`).fill(name);
    await next.getByRole('button', { name: 'Add it and write its rulebook' }).click();
    await page.waitForURL(/\/start$/);
    await official.expectAccessible();
    await page.getByLabel(new RegExp(`${name}, season .*, edition 1`)).check();
    await page.getByRole('button', { name: 'Start writing' }).click();
    await page.waitForURL(/\/draft\//);
    await ready(page);
    await page.locator('.clause-row', { hasText: 'Displacement' }).click();
    await page.getByRole('textbox', { name: 'At most', exact: true }).fill('355.0');
    // The words still say the old limit: the editor asks.
    await page.getByText(/The words do not say 355\.0/).waitFor();
    await page.getByLabel('Words', { exact: true }).fill('Displacement is at most 355.0 in³.');
    await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
    await sent(page);
    await settled(page);
    await page.getByRole('link', { name: 'Check before publishing' }).click();
    // What changes against last season's: one clause.
    const changes = page.locator('article.entry');
    await changes.first().waitFor();
    expect(await changes.count()).toBe(1);
    expect(await changes.textContent()).toContain('355.0 in³');
    await page.getByRole('button', { name: `Publish this edition for ${name}` }).click();
    await page.getByRole('rowheader', { name: 'Edition 1' }).waitFor();
    // An event is opened in the running season, though a newer one is there.
    await official.open('/office/events/new');
    const chosen = page.getByLabel('Season').locator('option:checked');
    expect(await chosen.textContent()).toMatch(/, \d{4}$/);
  });
});
