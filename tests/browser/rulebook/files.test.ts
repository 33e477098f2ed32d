import { expect, test } from 'vitest';
import { journey, type Visitor } from '../../support/browser';
import { readProduct } from '../../support/product';
import {
  OFFICIAL,
  openClassInForce,
  openNewClass,
  publicAddress,
  publishFromEditor,
  ready,
  settled,
} from './steps';

interface File {
  readonly title: string;
  readonly clauses: readonly { readonly number: string; readonly words: string }[];
  readonly penalties: readonly unknown[];
}

const fetched = async (path: string): Promise<string> => {
  const response = await fetch(new URL(path, readProduct().publicUrl));
  expect([path, response.status]).toEqual([path, 200]);
  return response.text();
};

const give = async ({ page, open }: Visitor, office: string, name: string, text: string) => {
  await open(`${office}/start`);
  await page.getByLabel('Or from a file').setInputFiles({
    name,
    mimeType: name.endsWith('.csv') ? 'text/csv' : 'application/json',
    buffer: Buffer.from(text),
  });
  await page.getByRole('button', { name: 'Start writing' }).click();
};

test('a rulebook goes out as JSON and as CSV and comes back without loss; a faulty file takes nothing over', async () => {
  await journey('rulebook files', async ({ enter }) => {
    const official = await enter();
    const { page } = official;
    await official.signInAs(OFFICIAL);
    const stamp = Date.now().toString(36);
    const first = await openClassInForce(official, `Sent ${stamp}`);
    const json = await fetched(`${first.address}/rulebook.json`);
    const out = JSON.parse(json) as File;
    expect(out.clauses.length).toBeGreaterThan(10);

    // By the links of the public page, as a reader finds them.
    const reader = await enter();
    await reader.open(first.address);
    const download = reader.page.waitForEvent('download');
    await reader.page.getByRole('link', { name: 'As JSON' }).click();
    expect((await download).suggestedFilename()).toMatch(/\.json$/);

    const office = await openNewClass(official, `Taken ${stamp}`);
    const faulty = {
      ...out,
      clauses: out.clauses.map((one, i) => (i === 2 ? { ...one, number: 'four' } : one)),
      penalties: [{ row: 'A' }],
    };
    official.expectRefusal({ url: /\/start$/, status: 422 });
    await give(official, office, 'faulty.json', JSON.stringify(faulty));
    await page.getByRole('heading', { name: 'Not started: nothing was taken over' }).waitFor();
    const told = (await page.getByRole('alert').textContent()) ?? '';
    expect(told).toContain('clauses 3 (four), number');
    expect(told).toContain('penalties 1, breach');
    await official.expectAccessible();
    await official.open(office);
    await settled(page);
    expect(await page.locator('main').textContent()).toContain('No edition is in force.');
    expect(await page.getByRole('link', { name: /Next edition/ }).count()).toBe(0);

    await give(official, office, 'sent.json', json);
    await page.waitForURL(/\/draft\//);
    await ready(page);
    await publishFromEditor(page, office);
    const back = JSON.parse(await fetched(`${await publicAddress(page)}/rulebook.json`)) as File;
    expect({ clauses: back.clauses, penalties: back.penalties }).toEqual({
      clauses: out.clauses,
      penalties: out.penalties,
    });

    // The clauses alone, with one changed by hand, into the next edition of the same class.
    const csv = await fetched(`${await publicAddress(page)}/clauses.csv`);
    const words = out.clauses.find((one) => one.number === '4.4')?.words ?? '';
    expect(csv).toContain(words);
    await give(official, office, 'clauses.csv', csv.replace(words, 'No bore is bushed.'));
    await page.waitForURL(/\/draft\//);
    await ready(page);
    await publishFromEditor(page, office);
    await page.getByRole('rowheader', { name: 'Edition 2' }).waitFor();
    const next = JSON.parse(await fetched(`${await publicAddress(page)}/rulebook.json`)) as File;
    expect(next.clauses).toEqual(
      out.clauses.map((one) =>
        one.number === '4.4' ? { ...one, words: 'No bore is bushed.' } : one,
      ),
    );
    expect(next.penalties).toEqual(out.penalties);

    official.expectRefusal({ url: /\/start$/, status: 422 });
    await give(official, office, 'clauses.csv', 'number,words\n4,Fine\n4..4,Not\n');
    const lines = (await page.getByRole('alert').textContent()) ?? '';
    expect(lines).toContain('Line 3, number');
  });
});
