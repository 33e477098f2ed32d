import { createHash, randomUUID } from 'node:crypto';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../support/browser';
import { runPrintedScript, verifyPublicDraw } from '../support/draw';
import { readProduct } from '../support/product';
import { eventually } from '../support/wait';

const phone = { width: 390, height: 844 };
const OFFICIAL = 'Ilse Törnkvist';
const CLASS = 'Street Eight';
const { publicUrl } = readProduct();

/** The sections of a class on a public page of draws, by where each draw stands. */
const drawOf = ({ page }: Visitor, state: 'announced' | 'made' | 'void', raceClass = CLASS) =>
  page
    .locator(`[data-draw="${state}"]`)
    .filter({ has: page.getByRole('heading', { name: new RegExp(`^${raceClass}`) }) });

/** Local time at the track, as the form writes it, of the next whole minute that is still to come. */
const nextMinute = (zone: string): { readonly written: string; readonly at: number } => {
  // A minute that is about to end leaves no time to announce.
  const at = Math.ceil((Date.now() + 20_000) / 60_000) * 60_000;
  const parts = new Intl.DateTimeFormat('sv-SE', {
    timeZone: zone,
    dateStyle: 'short',
    timeStyle: 'short',
  }).format(at);
  return { written: parts.replace(' ', 'T'), at };
};

/** Counts taps and clicks in this browser from now on, over every page it opens. */
const countTaps = async ({ page, context }: Visitor): Promise<() => Promise<number>> => {
  let count = 0;
  await context.exposeBinding('tapped', () => {
    count += 1;
  });
  const listen = () =>
    document.addEventListener(
      'click',
      (event) => {
        // A label's click is told again to its field.
        if (event.isTrusted && event.detail > 0)
          (window as unknown as { tapped: () => void }).tapped();
      },
      true,
    );
  await context.addInitScript(listen);
  await page.evaluate(listen);
  return async () => count;
};

const toClass = async ({ page, open }: Visitor, event: RegExp, raceClass = CLASS) => {
  await open('/office/events');
  await page.getByRole('link', { name: event }).first().click();
  const id = /events\/([0-9a-f-]{36})/.exec(page.url())?.[1] ?? '';
  await open(`/office/draws/${id}`);
  await page.getByRole('link', { name: raceClass }).click();
  await page.getByRole('heading', { name: `Draw, ${raceClass}` }).waitFor();
};

const announce = async (visitor: Visitor, session: string | undefined, shot?: string) => {
  const { page } = visitor;
  await page.getByRole('link', { name: /^Announce/ }).click();
  if (session !== undefined) await page.getByLabel('When do the values begin').fill(session);
  if (shot !== undefined) {
    await visitor.expectAccessible();
    await visitor.expectNoSidewaysScroll();
    await visitor.shot(`${shot}-form`);
  }
  await page.getByRole('button', { name: 'Check the announcement' }).click();
  await page.getByRole('heading', { name: 'Check the announcement' }).waitFor();
  if (shot !== undefined) {
    await visitor.expectAccessible();
    await visitor.shot(`${shot}-check`);
  }
  await page.getByRole('button', { name: 'Announce it to everybody' }).click();
  await page.getByText('Nobody can read it before the draw is made').waitFor();
};

test('a draw is announced and declared void on a phone, and everybody reads why', async () => {
  await journey('void draw', async ({ enter }) => {
    const official = await enter({ viewport: phone, touch: true });
    await official.signInAs(OFFICIAL);
    await toClass(official, /Tallow Mere Evening/, 'Modified Four');
    await announce(official, undefined, 'draw-390-announce');
    const { page } = official;
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await official.shot('draw-390-announced');
    expect(await page.getByRole('link', { name: 'Enter the values' }).count()).toBe(0);
    await page.getByRole('link', { name: /declare it void/ }).click();
    official.expectRefusal({ url: /\/void$/, status: 422 });
    await page.getByRole('button', { name: 'Declare the draw void' }).click();
    await page.getByText('Say why the draw cannot count').first().waitFor();
    await official.shot('draw-390-void-form');
    await page.getByLabel('Why can it not count?').fill('The meeting was moved to another day.');
    await page.getByRole('button', { name: 'Declare the draw void' }).click();
    await page.getByText('The meeting was moved to another day.').waitFor();
    await announce(official, undefined);

    const visitor = await enter();
    await visitor.open('/series/corran-valley/events/round-2/draw');
    expect(await drawOf(visitor, 'void', 'Modified Four').textContent()).toContain(
      'The meeting was moved to another day.',
    );
    expect(await drawOf(visitor, 'announced', 'Modified Four').textContent()).toContain(
      'This draw follows one that was declared void',
    );
    await visitor.expectAccessible();
    await visitor.shot('draw-1280-void');
  });
});

test('a draw at a hand-scored track: announced, made once, checked by a stranger and by a script', async () => {
  await journey('draw made', async ({ enter }) => {
    const official = await enter({ viewport: phone, touch: true });
    const { page } = official;
    await official.signInAs(OFFICIAL);
    await toClass(official, /Quarrel Fen Opener/);
    const session = nextMinute('America/Chicago');
    const taps = await countTaps(official);
    const began = performance.now();
    await announce(official, session.written);
    const announcing = { taps: await taps(), seconds: (performance.now() - began) / 1000 };

    const visitor = await enter({ viewport: { width: 1280, height: 900 } });
    const draw = '/series/corran-valley/events/round-1/draw';
    await visitor.open(draw);
    const announced = drawOf(visitor, 'announced');
    expect(await announced.textContent()).toContain('Two dice');
    await visitor.expectAccessible();
    await visitor.shot('draw-1280-announced');
    const href = await announced
      .getByRole('link', { name: 'The announcement as a file' })
      .getAttribute('href');
    const noted = await (await fetch(`${publicUrl}${href}`)).text();

    await eventually(
      'the session to begin',
      async () => {
        await page.reload();
        const link = page.getByRole('link', { name: 'Enter the values' });
        return (await link.count()) === 1 ? true : undefined;
      },
      120_000,
    );
    expect(Date.now()).toBeGreaterThanOrEqual(session.at);
    const [before, again] = [await taps(), performance.now()];
    await page.getByRole('link', { name: 'Enter the values' }).click();
    const numbers = page.getByLabel('Numbers');
    official.expectRefusal({ url: /\/values$/, status: 422 });
    await numbers.nth(0).fill('7 11,4');
    await numbers.nth(1).fill('25 25 24');
    await page.getByRole('button', { name: 'Read the values back' }).click();
    await page.getByText('“11,4” is no whole number').first().waitFor();
    expect(await numbers.nth(1).inputValue()).toBe('25 25 24');
    await official.expectAccessible();
    await official.shot('draw-390-values-fault');
    await numbers.nth(0).fill('07 11 4');
    await page.getByRole('button', { name: 'Read the values back' }).click();
    await page.getByRole('heading', { name: 'Read the values back' }).waitFor();
    expect(await page.locator('.sheet-draft').textContent()).toMatch(/7\s*11\s*4/);
    await official.expectNoSidewaysScroll();
    await official.shot('draw-390-read-back');
    await page.getByRole('button', { name: 'Make the draw now' }).click();
    const cars = page.getByRole('list', { name: 'Cars in the order drawn' });
    await cars.waitFor();
    const making = { taps: (await taps()) - before, seconds: (performance.now() - again) / 1000 };
    // One wrong value and its correction are among them.
    console.info(
      `A draw at a hand-scored track: announced with ${announcing.taps} taps, made with ${making.taps}; by this machine ${announcing.seconds.toFixed(1)} s and ${making.seconds.toFixed(1)} s.`,
    );
    expect(announcing.taps).toBeLessThanOrEqual(4);
    expect(making.taps).toBeLessThanOrEqual(6);
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await official.shot('draw-390-made');
    expect(await cars.textContent()).toMatch(/inspection opened|picked already/);
    expect(await page.getByRole('link', { name: /nnounce/ }).count()).toBe(0);

    const result = drawOf(visitor, 'made');
    await eventually('the head that covers the result', async () => {
      const id = /draws\/[^/]+\/([^/]+)/.exec(href ?? '')?.[1] ?? '';
      const { end } = await (await fetch(`${publicUrl}/api/draws/corran-valley/${id}`)).json();
      return end?.proof === null ? undefined : true;
    });
    await eventually('the result on the public page', async () => {
      await visitor.open(draw);
      return (await drawOf(visitor, 'made').count()) === 1 ? true : undefined;
    });
    await result.getByRole('button', { name: 'Run it again in this browser' }).click();
    await result.getByRole('button', { name: 'Next step' }).waitFor();
    const steps = result.locator('[data-stage]');
    expect(await steps.count()).toBe(1);
    await result.getByRole('button', { name: 'Next step' }).click();
    expect(await steps.count()).toBe(2);
    await result.getByRole('button', { name: 'All steps' }).click();
    await result.locator('[data-conclusion="passed"]').waitFor();
    expect(await result.locator('[data-conclusion]').textContent()).toContain('Every step holds');
    expect(await steps.count()).toBeGreaterThan(15);
    expect(await result.locator('[data-outcome]:not([data-outcome="passed"])').count()).toBe(0);
    const noted8 = createHash('sha256').update(noted).digest('hex').slice(0, 8);
    await result.getByLabel('Did you note the announcement').fill(noted8.toUpperCase());
    await result.getByRole('button', { name: 'Compare' }).click();
    await result.getByText('It is the same announcement.').waitFor();
    await result
      .getByLabel('Did you note the announcement')
      .fill(`${noted8.startsWith('0') ? '1' : '0'}${noted8.slice(1)}`);
    await result.getByRole('button', { name: 'Compare' }).click();
    await result.getByText('It is not the announcement shown here.').waitFor();
    await visitor.expectAccessible();
    await visitor.expectNoSidewaysScroll();
    await visitor.shot('draw-1280-rerun');

    const made = await (
      await fetch(`${publicUrl}${href?.replace('commitment.json', 'made.json')}`)
    ).text();
    const script = runPrintedScript(noted, made);
    expect(script.code).toBe(0);
    const drawn = script.says.replace('same: ', '').split(', ');
    for (const car of drawn)
      expect(await result.locator('.sheet-closed').textContent()).toContain(car);
    const drawId = /draws\/[^/]+\/([^/]+)/.exec(href ?? '')?.[1] ?? '';
    const verified = verifyPublicDraw(publicUrl, 'corran-valley', drawId);
    expect(verified.code, verified.says).toBe(0);
    expect(verified.says.split('\n').at(-1)).toBe(`verified: ${drawn.join(', ')}`);
    expect(verifyPublicDraw(publicUrl, 'corran-valley', randomUUID()).code).toBe(1);
  });
});

test.each([390, 820, 1280])(
  'a made draw is sound at %i px, with script and without',
  async (width) => {
    await journey(`public draw ${width}`, async ({ enter }) => {
      for (const javaScript of [true, false]) {
        const visitor = await enter({ viewport: { width, height: 1180 }, javaScript });
        await visitor.open('/series/corran-valley/events/round-1/draw');
        const made = drawOf(visitor, 'made');
        await made.locator('summary').first().click();
        expect(await made.locator('[data-stage="same-cars"]').textContent()).toContain('Drawn: ');
        await visitor.expectNoSidewaysScroll();
        if (javaScript) await visitor.expectAccessible();
        await visitor.shot(`draw-${width}-public${javaScript ? '' : '-plain'}`);
      }
    });
  },
);
