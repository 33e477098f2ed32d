import { expect, test } from 'vitest';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey } from '../../support/browser';
import { keptOf, openEngine, openSheet, SCREENED } from './engine';
import { allSent, Hand } from './hand';

const MINUTES = 60_000;
const LANDSCAPE = { viewport: { width: 1180, height: 820 }, touch: true };

/** Each 0.0017 in over its lifter of 0.8422 or 0.8421 in by a ring of 0.8440 in: near no limit. */
const BANK = ['-1', '-2', '-1', '-2', '-1', '-2', '-1', '-2'];

/** A bank of eight bores between two zeros, by one reading each. */
const screenBank = async (hand: Hand, readings: readonly string[]) => {
  const { page } = hand;
  await page.getByRole('button', { name: 'Enter opening zero' }).waitFor();
  await hand.press('0', 'Enter');
  for (const reading of readings) await hand.read(reading);
  await page.getByRole('button', { name: 'Enter closing zero' }).waitFor();
  await hand.press('0', 'Enter');
  await page.getByText('The zero held').waitFor();
  await hand.press('Enter');
};

test('a screened engine of sixteen bores, by keys alone', { timeout: 4 * MINUTES }, async () => {
  const { id, path } = await openEngine(SCREENED);
  await journey('screened engine', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    await openSheet(visitor, path);
    const { page } = visitor;
    const hand = new Hand(page);
    await page.getByText('0.84‥ implied, or all digits').waitFor();
    for (let bore = 0; bore < 16; bore += 1) await hand.read(bore % 2 === 0 ? '22' : '21');
    await page.getByRole('button', { name: /^Enter on to bore/ }).waitFor();
    await hand.press('Enter');
    await screenBank(hand, BANK);
    await page.getByRole('button', { name: /^Enter on to/ }).waitFor();
    await visitor.shot('screened-bank');
    await hand.press('Enter');
    await screenBank(hand, BANK);
    await hand.press('Enter');
    for (let bore = 0; bore < 16; bore += 1) {
      await page.getByText('key 1', { exact: true }).waitFor();
      await hand.press('1');
      const answered = bore + 1;
      await page
        .locator('.only-wide text', { hasText: /^1\/1$/ })
        .nth(answered - 1)
        .waitFor();
    }
    await allSent(visitor);
    const kept = await keptOf(id);
    expect(kept.readings).toHaveLength(32);
    expect(new Set(kept.readings.map(({ place }) => place)).size).toBe(16);
    expect(kept.readings.slice(0, 2).map(({ value }) => value)).toEqual(['0.8422', '0.8421']);
    expect(kept.zeros).toBe(4);
    expect(kept.remarks).toEqual({ check: 16 });
    hand.report('Screened engine, 16 bores, lifter and bore once each, 16 plug gauges');
    expect(Math.max(...hand.perReading)).toBeLessThanOrEqual(3);
    await page.getByRole('button', { name: 'Bore', exact: true }).click();
    await page.locator('.tally', { hasText: '16' }).waitFor();
    await visitor.shot('screened-engine');
    await visitor.expectAccessible();
  });
});

test('a full sheet, sixteen bores of six readings and their lifters, by keys alone', {
  timeout: 8 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(
    TAPPET_RULE_SET.clauses.filter(({ number }) => ['4.2', '4.6'].includes(number)),
  );
  await journey('full sheet', async ({ enter }) => {
    const visitor = await enter(LANDSCAPE);
    await openSheet(visitor, path);
    const { page } = visitor;
    const hand = new Hand(page);
    await hand.tap('More');
    await hand.tap(/^Set up/);
    await page.getByLabel('How much').selectOption('third-axis');
    hand.taps += 2;
    await hand.tap('Back');
    await hand.tap('Back');
    const on = async (name: RegExp) => {
      await page.getByRole('button', { name }).waitFor();
      await hand.press('Enter');
    };
    for (let bore = 0; bore < 16; bore += 1) {
      for (const digits of ['23', '22', '23', '23']) await hand.read(digits);
      await on(/^Enter on to/);
    }
    for (let bank = 0; bank < 2; bank += 1) {
      await page.getByRole('button', { name: 'Enter opening zero' }).waitFor();
      await hand.press('0', 'Enter');
      for (let bore = 0; bore < 8; bore += 1) {
        for (const digits of ['0', '1', '0', '1', '2', '1']) await hand.read(digits);
        if (bore < 7) await on(/^Enter on to/);
      }
      await page.getByRole('button', { name: 'Enter closing zero' }).waitFor();
      await hand.press('1', 'Enter');
      await page.getByText('The zero held').waitFor();
      await hand.press('Enter');
      if (bank === 0) await on(/^Enter on to/);
    }
    await allSent(visitor);
    const kept = await keptOf(id);
    const count = (quantity: string) =>
      kept.readings.filter((row) => row.quantity === quantity).length;
    expect(count('tappet-bore-diameter')).toBe(96);
    expect(count('lifter-body-diameter')).toBe(64);
    expect(new Set(kept.readings.map(({ place }) => place)).size).toBe(16);
    expect(kept.zeros).toBe(4);
    hand.report('Full sheet, 16 bores × 6 and 16 lifters × 4');
    expect(Math.max(...hand.perReading)).toBeLessThanOrEqual(3);
    await visitor.shot('full-sheet');
  });
});
