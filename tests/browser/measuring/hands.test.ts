import { expect, test } from 'vitest';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey, type Visitor } from '../../support/browser';
import { phonePicture } from '../thread/files';
import { CHIEF, keptOf, openEngine, openSheet, SCREENED, sheetReady } from './engine';
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

const start = async (visitor: Visitor, path: string) => {
  await openSheet(visitor, path);
  return new Hand(visitor.page);
};

test('a run whose zero moved names its bores, keeps what was read, and is read again', {
  timeout: 3 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(SCREENED);
  await journey('redo', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    const hand = await start(visitor, path);
    const { page } = visitor;
    await page.getByRole('button', { name: 'Bore', exact: true }).click();
    await hand.press('0', 'Enter');
    for (const digits of ['1', '2', '1']) await hand.read(digits);
    await page.getByRole('button', { name: 'Take the closing zero' }).click();
    await hand.press('5', 'Enter');
    await page.getByText('The zero moved too far').waitFor();
    await visitor.shot('zero-moved');
    await visitor.expectAccessible();
    await page.getByRole('button', { name: 'Read 3 bores again' }).click();
    await page.getByRole('button', { name: 'Enter opening zero' }).waitFor();
    await hand.press('0', 'Enter');
    for (const digits of ['1', '2', '1']) await hand.read(digits);
    await page.getByRole('button', { name: 'Take the closing zero' }).click();
    await hand.press('0', 'Enter');
    await page.getByText('The zero held').waitFor();
    // Enter says that it was seen, and goes nowhere by itself.
    const before = await page.locator('.bore-name').first().textContent();
    await hand.press('Enter');
    await page.getByText('The zero held').waitFor({ state: 'detached' });
    expect(await page.locator('.bore-name').first().textContent()).toBe(before);
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.readings).toHaveLength(6);
    expect(kept.remarks).toEqual({ strike: 3 });
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText('All of them, in taking order').click();
    expect(await page.getByRole('row', { name: /struck: zero moved/ }).count()).toBe(3);
  });
});

test('a set entered at the wrong bore is moved: two taps and the bore', {
  timeout: 3 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('wrong bore', async ({ enter }) => {
    const visitor = await enter(PORTRAIT);
    const hand = await start(visitor, path);
    const { page } = visitor;
    await bore(visitor, '3 exhaust').click();
    await hand.read('23');
    await bore(visitor, '3 exhaust').click();
    await page.getByText('0.8423').first().waitFor();
    hand.taps = 0;
    await hand.tap('More');
    await hand.tap('Move this set to another bore');
    await visitor.shot('move-portrait');
    await hand.tap('5 intake');
    expect(hand.taps).toBe(3);
    await page.locator('.bore-name', { hasText: 'Bore 5' }).waitFor();
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.readings.map(({ place, value }) => `${place}: ${value}`)).toEqual([
      '3 exhaust: 0.8423',
    ]);
    expect(kept.remarks).toEqual({ move: 1 });
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText('All of them, in taking order').click();
    await page.getByRole('row', { name: /5 intake.*moved from 3 exhaust/ }).waitFor();
  });
});

test('an independent second set is taken without the first in sight, and both are then seen', {
  timeout: 5 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('second set', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    const hand = await start(visitor, path);
    const { page } = visitor;
    // 4.2 permits up to 0.8426: one reading there asks the full sheet at once.
    await bore(visitor, '3 exhaust').click();
    await hand.read('8426');
    await page.getByText('near a limit: the full sheet is asked').waitFor();
    for (const digits of ['8426', '8426', '8426']) await hand.read(digits);
    await page.getByText('Too close to call', { exact: true }).first().waitFor();
    await visitor.shot('near-limit');
    await allSent(visitor);

    const other = await enter(PORTRAIT);
    const wanted = await visitor.context.request.get(
      visitor.page.url().replace(/\/measure.*$/, ''),
    );
    expect(await wanted.text()).toContain(`${path}?second=3%20exhaust`);
    await openSheet(other, `${path}?second=3%20exhaust`, CHIEF);
    await other.page.getByText('second set, first hidden').waitFor();
    const source = await (await other.context.request.get(other.page.url())).text();
    expect(source).not.toContain('0.8426');
    expect(await other.page.locator('body').textContent()).not.toContain('0.8426');
    await other.shot('second-set-blind');
    await other.expectAccessible();
    const second = new Hand(other.page);
    for (const digits of ['8425', '8424', '8425', '8425']) await second.read(digits);
    await other.page.getByRole('button', { name: 'See both sets' }).waitFor();
    expect(await other.page.locator('body').textContent()).not.toContain('0.8426');
    await allSent(other);
    await other.page.getByRole('button', { name: 'See both sets' }).click();
    await other.page.getByText(/Two sets, the second by another inspector/).waitFor();
    await other.shot('second-set-both');
    await other.page.getByLabel('Because').fill('Both were taken with care.');
    await other.page.getByRole('button', { name: 'Keep this choice' }).click();
    await other.page.getByText('Both stand, pooled').waitFor();
    await allSent(other);
    const kept = await keptOf(id);
    expect(kept.readings.map(({ set, standing }) => `${set} ${standing}`)).toEqual([
      ...Array(4).fill('1 accepted'),
      ...Array(4).fill('2 accepted'),
    ]);
    expect(new Set(kept.readings.map(({ by }) => by)).size).toBe(2);
    expect(kept.remarks).toEqual({ 'second-set': 1 });
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText(/The second by another inspector. They\s+agree/).waitFor();
    await visitor.shot('second-set-report');
    await visitor.expectAccessible();
  });
});

test('one inspector alone repeats after a new zero, and it is recorded as a repeat', {
  timeout: 4 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('repeat alone', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    const hand = await start(visitor, path);
    const { page } = visitor;
    await hand.read('23');
    await bore(visitor, '1 exhaust').click();
    await page.getByRole('button', { name: 'Bore', exact: true }).click();
    await hand.press('0', 'Enter');
    await hand.read('2');
    await page.getByRole('button', { name: 'Take the closing zero' }).click();
    await hand.press('0', 'Enter', 'Enter');
    await bore(visitor, '1 exhaust').click();
    await allSent(visitor);
    await hand.tap('More');
    await hand.tap(/^Independent second set/);
    await page.waitForURL(/second=1/);
    await sheetReady(page);
    await page.getByRole('button', { name: 'Enter opening zero' }).waitFor();
    expect(await page.locator('.measuring').textContent()).not.toContain('+0.2');
    await hand.press('0', 'Enter');
    for (const digits of ['1', '2', '1', '2']) await hand.read(digits);
    await page.getByRole('button', { name: 'Enter closing zero' }).waitFor();
    await hand.press('0', 'Enter');
    await page.getByText('The zero held').waitFor();
    await hand.press('Enter');
    await page.getByRole('button', { name: 'See both sets' }).click();
    await page.getByText(/by the same inspector: a re-zeroed repeat/).waitFor();
    await visitor.shot('repeat-alone');
    const kept = await keptOf(id);
    expect(kept.readings.filter(({ set }) => set === 2)).toHaveLength(4);
    expect(kept.readings.every(({ standing }) => standing === 'accepted')).toBe(true);
  });
});

test('lifters are racked by bore, and their return is signed for', {
  timeout: 3 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('rack', async ({ enter }) => {
    const visitor = await enter(PORTRAIT);
    const hand = await start(visitor, path);
    const { page } = visitor;
    await page.getByLabel('What else is read').selectOption('rack');
    await page.getByRole('button', { name: /^Out, racked as/ }).waitFor();
    await hand.press('Enter');
    await page.getByText('1 out, 0 in again, 15 not taken out.').waitFor();
    await hand.tap('All 15 out, racked by bore');
    await page.getByText('16 out, 0 in again, 0 not taken out.').waitFor();
    await visitor.shot('rack-out');
    await bore(visitor, '1 exhaust').click();
    await hand.tap('Into another bore');
    await hand.tap('1 intake');
    await page.getByText('A flat tappet that has run stays with its own lobe.').first().waitFor();
    await bore(visitor, '1 intake').click();
    await hand.tap('Into another bore');
    await hand.tap('1 exhaust');
    await page.getByText('14 out, 2 in again').waitFor();
    await hand.tap(/^All 14 in/);
    await visitor.shot('rack-sign');
    await visitor.expectAccessible();
    await page.getByLabel('Signed for by').fill('Fenn Ostrava');
    await hand.tap('Sign: all back, 2 in other bores');
    await page.getByText('Return signed for').waitFor();
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.remarks).toEqual({ 'lifter-out': 16, 'lifter-in': 16, 'lifters-returned': 1 });
    await visitor.open(`/barn/inspections/${id}`);
    await page.getByText(/Signed for by Fenn Ostrava, .*order changed/).waitFor();
  });
});

test('a photograph is tied to its bore in two taps without signal, and goes when there is some', {
  timeout: 3 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('photograph', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    const hand = await start(visitor, path);
    const { page, context } = visitor;
    await bore(visitor, '5 intake').click();
    visitor.expectRefusal({ url: /\/api\//, status: 'offline' });
    await context.setOffline(true);
    // The first tap opens the camera, the second is its shutter.
    const [chooser] = await Promise.all([
      page.waitForEvent('filechooser'),
      page.getByText('Photograph 5 intake').click(),
    ]);
    const picture = await phonePicture('bay');
    await chooser.setFiles(picture);
    await page.getByText('5 intake: 1').waitFor();
    await hand.read('23');
    await page.locator('.saved-line', { hasText: /2 entries not sent yet/ }).waitFor();
    expect((await keptOf(id)).readings).toHaveLength(0);
    await context.setOffline(false);
    await page.reload();
    await sheetReady(page);
    await bore(visitor, '5 intake').click();
    await page.getByText('5 intake: 1').waitFor();
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.remarks).toEqual({ photograph: 1 });
    expect(kept.readings).toHaveLength(1);
    await hand.tap('More');
    await page.getByRole('img', { name: 'Photograph of 5 intake' }).waitFor();
    await visitor.shot('photograph-kept');
  });
});

test.each([
  ['landscape', LANDSCAPE],
  ['portrait', PORTRAIT],
] as const)(
  'left-handed, %s: work and keys change sides, the map is never mirrored',
  async (name, screen) => {
    const { path } = await openEngine(SCREENED);
    await journey(`left-handed ${name}`, async ({ enter }) => {
      const visitor = await enter(screen);
      const hand = await start(visitor, path);
      const { page } = visitor;
      const box = async (selector: string) => {
        const found = await page.locator(selector).first().boundingBox();
        if (found === null) throw new Error(`${selector} is not there`);
        return found;
      };
      const order = async () => {
        const at = async (label: string) => {
          const found = await bore(visitor, label).boundingBox();
          if (found === null) throw new Error(`no ${label}`);
          return found;
        };
        const map = await box('.measuring-map');
        const [front, across] = [await at('1 exhaust'), await at('2 exhaust')];
        return [front, across].map(({ x, y }) => [Math.round(x - map.x), Math.round(y - map.y)]);
      };
      const right = await order();
      expect((await box('.measuring-pad')).x).toBeGreaterThan((await box('.measuring-work')).x);
      await hand.tap('More');
      await hand.tap(/^Set up/);
      await page.getByLabel('Keypad', { exact: true }).selectOption('left');
      await hand.tap('Back');
      await hand.tap('Back');
      expect((await box('.measuring-pad')).x).toBeLessThan((await box('.measuring-work')).x);
      expect(await order()).toEqual(right);
      await visitor.expectNoSidewaysScroll();
      expect(await page.evaluate(() => document.documentElement.scrollHeight)).toBeLessThanOrEqual(
        screen.viewport.height,
      );
      await visitor.shot(`left-handed-${name}`);
      await hand.read('23');
      await allSent(visitor);
    });
  },
);
