import { expect, test } from 'vitest';
import { journey, type Visitor } from '../../support/browser';
import { OFFICIAL, openClassInForce, settled } from './steps';

const ask = async ({ page, open }: Visitor, address: string, clause: string, words: string) => {
  await open(`${address}/clauses/${clause}`);
  await page.getByRole('link', { name: 'Ask about this clause' }).click();
  await page.getByLabel('Question', { exact: true }).waitFor();
  expect(await page.getByLabel('Clause', { exact: true }).inputValue()).toBe(clause);
  await page.getByLabel('Question', { exact: true }).fill(words);
  await page.getByRole('button', { name: 'Send the question' }).click();
  await page.locator('article.entry', { hasText: words }).waitFor();
};

const hashOf = async ({ page, open }: Visitor, address: string): Promise<string> => {
  await open(address);
  await settled(page);
  return (await page.locator('.hash').last().textContent()) ?? '';
};

test('a question is answered to its asker alone, or for everybody; the clarification can be withdrawn', async () => {
  await journey('rules questions', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const name = `Asked ${Date.now().toString(36)}`;
    const { office, address } = await openClassInForce(official, name);
    const competitor = await enter({ viewport: { width: 390, height: 844 } });
    await competitor.signInAs('Wren Halloway');
    const rival = await enter();

    await ask(competitor, address, '4.4', 'Is a sleeve a bush?');
    await competitor.expectAccessible();
    await competitor.expectNoSidewaysScroll();
    const mine = competitor.page.locator('article.entry', { hasText: 'Is a sleeve a bush?' });
    expect(await mine.textContent()).toContain('Not answered yet');
    await competitor.page.getByLabel('Question', { exact: true }).fill(' ');
    competitor.expectRefusal({ url: /\/ask$/, status: 422 });
    await competitor.page.getByRole('button', { name: 'Send the question' }).click();
    await competitor.page.getByRole('heading', { name: 'Not sent yet' }).waitFor();

    const { page } = official;
    await official.open(`${office}/questions`);
    await page.getByRole('link', { name: /Is a sleeve a bush/ }).click();
    await page.getByLabel('Answer', { exact: true }).fill('Yes, a sleeve is a bush.');
    await official.expectAccessible();
    await page.getByRole('button', { name: 'Send the answer' }).click();
    await page.getByText('Answered privately').waitFor();
    const untouched = await hashOf(rival, address);
    expect(await rival.page.locator('main').textContent()).not.toContain('a sleeve is a bush');
    await competitor.open(`${address}/ask`);
    expect(await mine.textContent()).toContain('Answered to you alone');
    expect(await mine.textContent()).toContain('Yes, a sleeve is a bush.');

    await ask(competitor, address, '4.4', 'Car 12J: may one bore be sleeved?');
    await official.open(`${office}/questions`);
    await page.getByRole('link', { name: /may one bore be sleeved/ }).click();
    await page.getByLabel('Answer', { exact: true }).fill('No bore may be sleeved.');
    await page.getByLabel('Everybody, as a numbered clarification').check();
    await page.getByLabel('The question as it is published').fill('May one bore be sleeved?');
    await page.getByRole('button', { name: 'Send the answer' }).click();
    await page.getByText('Clarification 1').waitFor();
    const clarified = await hashOf(rival, address);
    expect(clarified).not.toBe(untouched);
    const clause = rival.page.locator('[id="4.4"]');
    expect(await clause.textContent()).toContain('No bore may be sleeved.');
    expect(await clause.textContent()).not.toContain('12J');
    await rival.expectAccessible();

    await official.open(office);
    await page.getByRole('link', { name: 'Withdraw clarification 1' }).click();
    await page.getByLabel('Reason').fill('A bulletin will say it better.');
    await official.expectAccessible();
    await page.getByRole('button', { name: 'Withdraw clarification 1' }).click();
    await page.getByRole('rowheader', { name: 'Withdrawal 1' }).waitFor();
    const ended = await hashOf(rival, address);
    expect(new Set([untouched, clarified, ended]).size).toBe(3);
    expect(await clause.locator('del').textContent()).toContain('No bore may be sleeved.');
    expect(await clause.textContent()).toContain('withdrawal 1: nobody may rely on it');
    await rival.expectAccessible();
    await rival.shot('clarification-withdrawn');
  });
});

test('a waiver for one car stands beside its clause, with its reason and its end', async () => {
  await journey('waiver', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const name = `Waived ${Date.now().toString(36)}`;
    const { office, address } = await openClassInForce(official, name);
    const { page } = official;
    await page.getByRole('link', { name: 'Grant a waiver' }).click();
    await page.getByLabel('Clause', { exact: true }).selectOption('4.4');
    await page.getByLabel('Car number').fill('12j');
    await page.getByLabel('Reason').fill('Repaired before the rule.');
    official.expectRefusal({ url: /\/waive$/, status: 422 });
    const grant = page.getByRole('button', { name: 'Grant and publish this waiver' });
    await grant.click();
    await page.getByRole('heading', { name: 'Not granted' }).waitFor();
    expect(await page.getByRole('alert').textContent()).toContain('Say what is allowed instead');
    // What was typed is still there.
    expect(await page.getByLabel('Reason').inputValue()).toBe('Repaired before the rule.');
    await official.expectAccessible();
    await page.getByLabel('What is allowed instead').fill('One bushed bore may run.');
    await page.getByLabel(/^Until/).fill(`${new Date().getFullYear() + 1}-06-30T18:00`);
    await grant.click();
    await page.waitForURL(new RegExp(`${office}$`));
    await page.getByRole('rowheader', { name: 'Waiver 1' }).waitFor();

    const reader = await enter({ javaScript: false });
    await reader.open(address);
    const clause = await reader.page.locator('[id="4.4"]').textContent();
    expect(clause).toContain('Waiver 1, car 12J');
    expect(clause).toContain('One bushed bore may run.');
    expect(clause).toContain('Repaired before the rule.');
    const after = `${new Date().getFullYear() + 1}-06-30T18:00`;
    for (const [on, held] of [
      [`${new Date().getFullYear() + 1}-06-30T17:59:59`, true],
      [after, false],
    ] as const) {
      await reader.open(`${address}?on=${on}`);
      const words = await reader.page.locator('[id="4.4"]').textContent();
      expect([on, words?.includes('Waiver 1')]).toEqual([on, held]);
    }
  });
});
