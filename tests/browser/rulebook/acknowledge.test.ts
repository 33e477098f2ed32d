import { expect, test } from 'vitest';
import { journey } from '../../support/browser';
import { eventually } from '../../support/wait';
import { OFFICIAL, publishFromEditor, ready, sent, settled } from './steps';

const COMPETITOR = 'Wren Halloway';

test('owners of engines that a bulletin makes illegal are listed, told, and say that they have read it', async () => {
  await journey('bulletin acknowledged', async ({ enter }) => {
    const official = await enter();
    const { page } = official;
    await official.signInAs(OFFICIAL);
    await official.open('/office');
    await settled(page);
    await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
    await page.getByRole('link', { name: 'Street Eight', exact: true }).click();
    await page.waitForURL(/\/office\/rulebooks\/[0-9a-f-]+$/);
    await settled(page);
    const office = new URL(page.url()).pathname;
    await page.getByRole('button', { name: 'Write a bulletin' }).click();
    await page.waitForURL(/\/draft\//);
    await ready(page);
    const title = `Smaller engines ${Date.now().toString(36)}`;
    await page.getByLabel('Title').fill(title);
    await page.getByLabel('Reason').fill('Speeds rose.');
    // Far ahead: the rules that other journeys read stay as they are.
    await page.getByLabel('It counts').selectOption('instant');
    const from = page.getByRole('textbox', { name: 'From' });
    await from.fill(`${new Date().getFullYear() + 3}-01-01 00:00`);
    await from.press('Enter');
    await page.getByLabel('Clause in force').selectOption('3.1');
    await page.getByRole('button', { name: 'Change this clause' }).click();
    await page.getByLabel('Words', { exact: true }).fill('Displacement is at most 300.0 in³.');
    await page.getByRole('textbox', { name: 'At most', exact: true }).fill('300.0');
    await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
    await sent(page);
    await publishFromEditor(page, office);

    const row = page.getByRole('row').filter({ hasText: title });
    const number = /Bulletin (\d+)/.exec((await row.textContent()) ?? '')?.[1];
    await row.getByRole('link', { name: `Whom bulletin ${number} reached` }).click();
    await page.getByRole('heading', { name: 'Engines it made illegal' }).waitFor();
    const engine = page.locator('article.entry').filter({ hasText: 'Car 12J' });
    expect(await engine.textContent()).toContain('at most 300.0 in³: outside');
    const owner = engine.getByRole('row').filter({ hasText: COMPETITOR });
    expect(await owner.textContent()).toContain('not yet');
    await eventually('the message went out', async () => {
      await page.reload();
      return (await owner.textContent())?.includes('E-mail sent') || undefined;
    });
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await official.shot('bulletin-reach');

    const competitor = await enter({ viewport: { width: 390, height: 844 } });
    await competitor.signInAs(COMPETITOR);
    await competitor.open('/paddock');
    const own = competitor.page.getByRole('listitem').filter({ hasText: title });
    expect(await own.textContent()).toContain('no longer complies with it');
    await competitor.expectAccessible();
    await own.getByRole('button', { name: `I have read bulletin ${number}` }).click();
    await competitor.page.waitForURL(/\/paddock\/bulletins$/);
    expect(await own.textContent()).toMatch(/Read .*\d\d:\d\d/);
    await competitor.expectAccessible();
    await competitor.expectNoSidewaysScroll();
    await competitor.shot('bulletins-read');
    await competitor.open('/paddock');
    expect(await own.count()).toBe(0);

    await page.reload();
    expect(await owner.textContent()).toMatch(/\d\d:\d\d.*\d\d:\d\d/);
    expect(await owner.textContent()).not.toContain('not yet');
  });
});

test('at sign-on an official sees who has read what, and takes a person’s word by name', async () => {
  await journey('sign-on', async ({ enter }) => {
    const official = await enter({ viewport: { width: 820, height: 1180 } });
    const { page } = official;
    await official.signInAs(OFFICIAL);
    await official.open('/office/events');
    await settled(page);
    await page.getByRole('link', { name: 'Quarrel Fen Opener' }).first().click();
    await page.getByRole('link', { name: 'Sign-on' }).click();
    await page.getByRole('heading', { name: /^Sign-on/ }).waitFor();
    const row = page
      .getByRole('row')
      .filter({ hasText: /^408|\b408\b/ })
      .first();
    expect(await row.textContent()).toContain('nothing yet');
    const name = row.getByLabel('Who has read it, car 408');
    official.expectRefusal({ url: /\/sign-on$/, status: 422 });
    await name.fill(' ');
    await row.getByRole('button', { name: 'Record for car 408' }).click();
    expect(await page.getByRole('alert').textContent()).toContain('Car 408: Write the name');
    await name.fill('Perrin’s crew chief');
    await row.getByRole('button', { name: 'Record for car 408' }).click();
    await page.waitForURL(/#entry-/);
    await row.filter({ hasText: 'Bulletin 1: Perrin’s crew chief' }).waitFor();
    expect(await row.textContent()).toContain('at sign-on');
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await official.shot('sign-on');
  });
});
