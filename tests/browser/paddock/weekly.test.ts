import sharp from 'sharp';
import { expect, test } from 'vitest';
import { journey } from '../../support/browser';
import { look, OFFICIAL, PHONE } from '../thread/story';
import { newHand } from './hand';
import { openClass } from './weekly-class';

const MINUTES = 60_000;

/** Common practice for one-thumbed phone use, as an estimate: seconds for a tap, a letter, and one photograph in focus. */
const SECONDS = { tap: 2, key: 0.4, photograph: 30 };

const picture = async (at: number) => ({
  name: `picture ${at}.jpg`,
  mimeType: 'image/jpeg',
  buffer: await sharp({
    create: { width: 900, height: 700, channels: 3, background: `#8a8f8${at}` },
  })
    .jpeg()
    .toBuffer(),
});

test(
  'a weekly class: eight questions and four photographs from a phone, handed in',
  async () => {
    await journey('weekly class', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const className = `Weekly Eight ${stamp}`;
      const official = await enter();
      await official.signInAs(OFFICIAL);
      await openClass(official, className);

      const competitor = await enter(PHONE);
      await competitor.signInAs('Tobin Larkspur');
      const { page } = competitor;
      const hand = newHand();
      await competitor.open('/paddock');
      await hand.tap(page.getByRole('link', { name: /^Declare (an|another) engine$/ }).first());
      const wanted = page
        .getByLabel('Class', { exact: true })
        .locator('option', { hasText: className });
      await page
        .getByLabel('Class', { exact: true })
        .selectOption((await wanted.getAttribute('value')) ?? '');
      await hand.type(page.getByLabel('Car number'), '17');
      await hand.tap(page.locator('input[name="engine"][value="new"]'));
      await hand.type(page.getByLabel('Your name for it'), `W-${stamp}`.slice(0, 8));
      await hand.type(page.getByLabel('Block casting number'), '41-7730');
      await hand.type(page.getByLabel('Head casting numbers'), '62-118');
      await hand.type(page.getByLabel('Serial number'), '0417');
      await hand.tap(page.getByRole('button', { name: 'Begin the paperwork' }));
      await page.locator('[data-ready="yes"]').waitFor();

      // Three of the eight are answered by what the engine already has.
      await page.getByText('3 of 8 answered').waitFor();
      await hand.tap(page.getByLabel('Solid flat'));
      await hand.tap(page.getByRole('group', { name: /bushed/ }).getByLabel('No'));
      await hand.type(page.getByLabel(/^Displacement/), '355.3');
      await hand.type(page.getByLabel('Seal numbers'), 'T-0417');
      await hand.type(page.getByLabel('Who built the engine'), 'Sorrel Engines');
      await page.getByText('8 of 8 answered').waitFor();
      await look(competitor, 'weekly-questions');
      for (const [at, shot] of [
        'Block casting',
        'Carburettor base',
        'Tappet bores',
        'Lifter foot',
      ].entries()) {
        const button = page
          .locator('button')
          .and(page.getByRole('button', { name: new RegExp(`^Photograph ?: ${shot}`) }));
        await hand.photograph(page, button, await picture(at + 1));
      }
      await page.getByText('4 of 4').waitFor();
      await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();

      const bar = await page.locator('.foot-bar').boundingBox();
      expect(bar?.height ?? 999).toBeLessThanOrEqual(100);
      await look(competitor, 'weekly-complete');
      await hand.tap(page.getByRole('link', { name: 'Check and hand in' }));
      await page.getByRole('button', { name: 'Hand in version 1' }).waitFor();
      await look(competitor, 'weekly-check');
      await hand.tap(page.getByRole('button', { name: 'Hand in version 1' }));
      await page.getByText(/^Version 1, ledger line \d+, SHA-256/).waitFor();

      const [taps, keys, photographs] = [hand.taps(), hand.keys(), hand.photographs()];
      const minutes =
        (taps * SECONDS.tap + keys * SECONDS.key + photographs * SECONDS.photograph) / 60;
      console.info(
        `Weekly paperwork: ${taps} taps (a choice of class apart), ${keys} keys, ${photographs} photographs; by ${JSON.stringify(SECONDS)} s about ${minutes.toFixed(1)} min. Foot bar ${bar?.height} px.`,
      );
      expect(photographs).toBe(4);
      expect(taps).toBeLessThanOrEqual(40);
      expect(keys).toBeLessThanOrEqual(80);
      expect(minutes).toBeLessThan(10);
    });
  },
  5 * MINUTES,
);
