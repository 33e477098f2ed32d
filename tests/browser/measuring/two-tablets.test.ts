import { expect, test } from 'vitest';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey, type Visitor } from '../../support/browser';
import { eventually } from '../../support/wait';
import { CHIEF, INSPECTOR, keptOf, openEngine, openSheet, sheetReady } from './engine';
import { allSent, Hand } from './hand';

const MINUTES = 60_000;
const LANDSCAPE = { viewport: { width: 1180, height: 820 }, touch: true };
const PORTRAIT = { viewport: { width: 820, height: 1180 }, touch: true };
const CLAUSES = TAPPET_RULE_SET.clauses.filter(({ number }) => ['4.2', '4.6'].includes(number));

const bore = ({ page }: Visitor, name: string) =>
  page
    .getByRole('button', { name: new RegExp(`^${name},`) })
    .filter({ visible: true })
    .first();

const cell = ({ page }: Visitor, name: string) => page.getByRole('button', { name, exact: true });

const read = ({ page }: Visitor) => page.locator('output.live-value').textContent();

test('two tablets on one sheet: what one reads and strikes is on the other at once', {
  timeout: 5 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('two tablets', async ({ enter }) => {
    const a = await enter(LANDSCAPE);
    const b = await enter(PORTRAIT);
    await openSheet(a, path, INSPECTOR);
    await openSheet(b, path, CHIEF);
    const [handA, handB] = [new Hand(a.page), new Hand(b.page)];
    // B stands at another bore and has typed half of a number.
    await bore(b, '5 intake').click();
    await handB.press('1');
    await bore(a, '3 exhaust').click();
    await handA.read('23');
    const heard = b.page.locator('.bar-cell', { hasText: INSPECTOR }).filter({
      hasText: '3 exhaust 0.8423',
    });
    await heard.waitFor();
    await b.shot('two-tablets-heard-portrait');
    await b.expectAccessible();
    expect(await b.page.locator('.bore-name').first().textContent()).toContain('5');
    expect(await read(b)).toBe('0.8421');
    await handB.press('9', 'Enter');
    await a.page
      .locator('.bar-cell', { hasText: CHIEF })
      .filter({ hasText: '5 intake 0.8419' })
      .waitFor();
    await a.shot('two-tablets-heard-landscape');

    // Both at one cell: B’s number stays where it was begun, and is a repeat.
    await bore(b, '7 intake').click();
    await handB.press('2');
    await bore(a, '7 intake').click();
    await handA.read('24');
    await b.page.getByText(`${INSPECTOR} has read this too: yours is a repeat`).waitFor();
    await handB.press('1', 'Enter');
    const both = await eventually('both readings of one cell', async () => {
      const { readings } = await keptOf(id);
      const here = readings.filter(({ place }) => place === '7 intake');
      return here.length === 2 ? here.map(({ value }) => value) : undefined;
    });
    expect(both).toEqual(['0.8424', '0.8421']);

    // A strikes: B’s sheet has it no more, and names who read what is left.
    await bore(b, '3 exhaust').click();
    await cell(b, 'Body, upper, Along: 0.8423').waitFor();
    await b.page.getByText(`last value, ${INSPECTOR}`).waitFor();
    await bore(a, '3 exhaust').click();
    await handA.tap('Strike last reading');
    await handA.tap('Written wrong');
    await cell(b, 'Body, upper, Along: empty').waitFor();
    await heard.filter({ hasText: 'struck' }).waitFor();
    await allSent(a);
    const kept = await keptOf(id);
    expect(kept.readings).toHaveLength(4);
    expect(kept.remarks).toEqual({ strike: 1 });

    // After a reload nothing is there twice, and nothing struck is back.
    await b.page.reload();
    await sheetReady(b.page);
    await cell(b, 'Body, upper, Along: empty').waitFor();
    await bore(b, '5 intake').click();
    await cell(b, 'Body, upper, Along: 0.8419').waitFor();
  });
});

test('where the stream is refused the sheet asks by itself, and still shows the other tablet', {
  timeout: 4 * MINUTES,
}, async () => {
  const { path } = await openEngine(CLAUSES);
  await journey('two tablets, no stream', async ({ enter }) => {
    const a = await enter(LANDSCAPE);
    const b = await enter(PORTRAIT);
    b.expectRefusal({ url: /\/live/, status: 'offline' });
    await b.page.route('**/api/barn/*/live*', (route) => route.abort());
    await openSheet(a, path, INSPECTOR);
    await openSheet(b, path, CHIEF);
    await b.page.getByText('Other tablets: asked every 10 s').waitFor();
    const hand = new Hand(a.page);
    await bore(a, '3 exhaust').click();
    await hand.read('23');
    await b.page.locator('.bar-cell', { hasText: '3 exhaust 0.8423' }).waitFor({ timeout: 25_000 });
  });
});

test('a blind second set goes through the bores near a limit alone, whatever the first tablet adds', {
  timeout: 6 * MINUTES,
}, async () => {
  const clauses = CLAUSES.map((clause) =>
    clause.number === '4.2' && clause.requirement?.kind === 'limit'
      ? { ...clause, requirement: { ...clause.requirement, twoSets: 'each' as const } }
      : clause,
  );
  const { id, path } = await openEngine(clauses);
  await journey('second sets', async ({ enter }) => {
    const a = await enter(LANDSCAPE);
    await openSheet(a, path, INSPECTOR);
    const handA = new Hand(a.page);
    for (const name of ['3 exhaust', '5 intake']) {
      await bore(a, name).click();
      await handA.read('8431');
      await a.page.getByText('near a limit: the full sheet is asked').waitFor();
      for (const digits of ['8430', '8431', '8430']) await handA.read(digits);
    }
    await bore(a, '7 intake').click();
    await handA.read('22');
    await bore(a, '3 exhaust').click();
    await a.page.getByText('one set alone shows a breach').first().waitFor();
    await a.shot('each-set-wanted');
    await allSent(a);
    await a.open(`/barn/inspections/${id}`);
    await a.page.getByRole('link', { name: 'Second set, 3 exhaust' }).waitFor();
    await a.page.getByRole('link', { name: 'Second set, 5 intake' }).waitFor();
    expect(await a.page.getByRole('link', { name: /^Second set, / }).count()).toBe(2);
    const href = await a.page
      .getByRole('link', { name: 'Second set, 3 exhaust' })
      .getAttribute('href');
    await a.open(path);
    await sheetReady(a.page);

    const b = await enter(PORTRAIT);
    await openSheet(b, href ?? '', CHIEF);
    await b.page.getByText('second set, first hidden').waitFor();
    const handB = new Hand(b.page);
    const hidden = /0\.843[01]/;
    expect(await (await b.context.request.get(b.page.url())).text()).not.toMatch(hidden);
    // The first tablet reads on, at one of the hidden bores too.
    await bore(a, '5 intake').click();
    await cell(a, 'Body, upper, Along: 0.8431').click();
    await handA.read('8431');
    await bore(a, '1 exhaust').click();
    await handA.read('21');
    await b.page.locator('.bar-cell', { hasText: '1 exhaust 0.8421' }).waitFor();
    expect(await b.page.locator('body').textContent()).not.toMatch(hidden);

    const second = ['8430', '8430', '8429', '8430'];
    for (const digits of second) await handB.read(digits);
    await b.page.getByRole('button', { name: 'Enter on to 5 intake' }).waitFor();
    await b.shot('second-set-next-bore');
    await handB.press('Enter');
    await b.page.getByText('second set, first hidden').waitFor();
    expect(await b.page.locator('body').textContent()).not.toContain('0.8431');
    for (const digits of second) await handB.read(digits);
    await b.page.getByRole('button', { name: 'See both sets' }).waitFor();
    await allSent(b);
    await handB.tap('See both sets');
    await b.page.getByText(/Two sets, the second by another inspector/).waitFor();
    await b.page.getByText('Clause 4.2: each set by itself').waitFor();
    await b.shot('each-set-both');

    await a.open(`/barn/inspections/${id}`);
    await a.page
      .getByText(/each set by itself: outside/)
      .first()
      .waitFor();
    await a.page.getByText('Clause 4.2 holds each set by itself.').first().waitFor();
    await a.shot('each-set-report');
    await a.expectAccessible();
  });
});
