import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { BrowserContext, Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { SESSION_COOKIE } from '@/http/session-cookie';
import { journey } from '../../support/browser';
import { killBrowser, launchAt } from '../../support/kept-browser';
import { readProduct } from '../../support/product';
import { eventually } from '../../support/wait';
import { INSPECTOR, keptOf, openEngine, openSheet, sessionOf, sheetReady } from './engine';
import { allSent, Hand } from './hand';
import { ownServer } from './own-server';

const MINUTES = 60_000;
const CLAUSES = TAPPET_RULE_SET.clauses.filter(({ number }) => ['4.2', '4.6'].includes(number));
const SCREENS = [
  ['landscape', { width: 1180, height: 820 }],
  ['portrait', { width: 820, height: 1180 }],
] as const;

/** Bodies of the first bores, each another number, so that a lost or doubled one would be seen. */
const BODIES = ['21', '22', '23', '19', '18'];
const FULL = BODIES.map((digits) => `0.84${digits}`);

/** What the screen has: the bore in the frame, and the bodies of the bores before it. */
const expectAll = async (page: Page, at: string) => {
  await sheetReady(page);
  await page.locator('.bore-name', { hasText: at }).waitFor();
  await page.getByRole('button', { name: 'Body, upper, Along: empty' }).waitFor();
};

const enterBodies = async (page: Page) => {
  const hand = new Hand(page);
  for (const [i, digits] of BODIES.entries()) {
    await hand.read(digits);
    await page
      .getByText(FULL[i] ?? '', { exact: true })
      .first()
      .waitFor();
  }
  // A number stands on the screen while it is typed; these say that it is kept and the hand has gone on.
  await page.getByText(`${BODIES.length} entries not sent yet`).waitFor();
  await page.getByRole('button', { name: 'Body, upper, Along: empty' }).waitFor();
};

const valuesOf = async (id: string) => (await keptOf(id)).readings.map(({ value }) => value);

test.each(SCREENS)(
  'a reload in the middle, %s, reopens at the same bore',
  { timeout: 3 * MINUTES },
  async (name, viewport) => {
    const { id, path } = await openEngine(CLAUSES);
    await journey(`reload ${name}`, async ({ enter }) => {
      const visitor = await enter({ viewport, touch: true });
      await openSheet(visitor, path);
      const { page } = visitor;
      visitor.expectRefusal({ url: /\/captures$/, status: 'offline' });
      await page.route('**/captures', (route) => route.abort());
      await enterBodies(page);
      const shown = await page.locator('.bore-name').first().textContent();
      expect(await valuesOf(id)).toEqual([]);
      const begun = performance.now();
      await page.reload();
      await expectAll(page, shown ?? '');
      await page.getByText(/5 entries not sent yet/).waitFor();
      console.log(
        `Reload, ${name}: at the same bore after ${Math.round(performance.now() - begun)} ms`,
      );
      await page.unroute('**/captures');
      await eventually('all on the server', async () =>
        (await valuesOf(id)).length === BODIES.length ? true : undefined,
      );
      expect(await valuesOf(id)).toEqual(FULL);
      await allSent(visitor);
    });
  },
);

test.each(SCREENS)(
  'the browser killed in the middle, %s, reopens at the same bore',
  { timeout: 4 * MINUTES },
  async (name, viewport) => {
    const { id, path } = await openEngine(CLAUSES);
    const folder = mkdtempSync(join(tmpdir(), 'tagwire-killed-'));
    const { publicUrl } = readProduct();
    const open = async (): Promise<{ context: BrowserContext; page: Page }> => {
      const context = await launchAt(folder, viewport);
      const value = await sessionOf(INSPECTOR);
      await context.addCookies([{ name: SESSION_COOKIE, value, url: publicUrl }]);
      const page = context.pages()[0] ?? (await context.newPage());
      return { context, page };
    };
    try {
      const first = await open();
      await first.page.goto(`${publicUrl}${path}`);
      await sheetReady(first.page);
      await first.page.route('**/captures', (route) => route.abort());
      await enterBodies(first.page);
      const shown = await first.page.locator('.bore-name').first().textContent();
      const killed = await killBrowser(folder);
      expect(killed).toBeGreaterThan(0);
      expect(await valuesOf(id)).toEqual([]);

      const begun = performance.now();
      const second = await open();
      await second.page.goto(`${publicUrl}${path}`);
      await expectAll(second.page, shown ?? '');
      console.log(
        `Browser killed, ${name}: at the same bore after ${Math.round(performance.now() - begun)} ms, its start included`,
      );
      await eventually('all on the server', async () =>
        (await valuesOf(id)).length === BODIES.length ? true : undefined,
      );
      expect(await valuesOf(id)).toEqual(FULL);
      await second.context.close();
    } finally {
      await killBrowser(folder);
      rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
    }
  },
);

test('a reading and where the hand goes on to are on the device at one moment', async () => {
  const { path } = await openEngine(CLAUSES);
  await journey('kept together', async ({ enter }) => {
    const visitor = await enter({ viewport: { width: 1180, height: 820 }, touch: true });
    await openSheet(visitor, path);
    const { page } = visitor;
    visitor.expectRefusal({ url: /\/captures$/, status: 'offline' });
    await page.route('**/captures', (route) => route.abort());
    // Looks at the device's store again and again: how many readings, and where it would open.
    const seen = await page.evaluateHandle(() => {
      const pairs: string[] = [];
      const opening = indexedDB.open('tagwire-bay');
      opening.onsuccess = () => {
        const look = () => {
          const read = opening.result.transaction(['acts', 'places'], 'readonly');
          const acts = read.objectStore('acts').count();
          const places = read.objectStore('places').getAll();
          read.oncomplete = () => {
            const [kept] = places.result as { place: { cursor: { bore: string } } }[];
            pairs.push(`${acts.result} ${kept?.place.cursor.bore ?? 'nowhere'}`);
            look();
          };
        };
        look();
      };
      return pairs;
    });
    await enterBodies(page);
    await eventually('a look after the last reading', async () =>
      (await seen.evaluate((pairs) => pairs.at(-1)))?.startsWith(`${BODIES.length} `)
        ? true
        : undefined,
    );
    const pairs = [...new Set(await seen.evaluate((all) => all))].filter((one) => !/^0 /.test(one));
    const counts = pairs.map((one) => one.split(' ')[0]);
    expect(counts.join(), pairs.join(', ')).toBe([...new Set(counts)].join());
    expect(counts.at(-1)).toBe(String(BODIES.length));
  });
});

test('an answer lost after the server wrote doubles nothing, and what follows waits for it', {
  timeout: 4 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  await journey('answer lost', async ({ enter }) => {
    const visitor = await enter({ viewport: { width: 1180, height: 820 }, touch: true });
    await openSheet(visitor, path);
    const { page, context } = visitor;
    const hand = new Hand(page);
    visitor.expectRefusal({ url: /\/api\//, status: 'offline' });
    // The server has it; the tablet hears nothing, as when the server ends between the two.
    await page.route(
      '**/captures',
      async (route) => {
        await route.fetch();
        await context.setOffline(true);
        await route.abort();
      },
      { times: 1 },
    );
    await hand.read('21');
    await eventually('the first reading on the server', async () =>
      (await valuesOf(id)).length === 1 ? true : undefined,
    );
    for (const digits of BODIES.slice(1)) await hand.read(digits);
    await page.getByText(/5 entries not sent yet/).waitFor();
    const begun = performance.now();
    await context.setOffline(false);
    await page.reload();
    await sheetReady(page);
    await eventually('all on the server', async () =>
      (await valuesOf(id)).length === BODIES.length ? true : undefined,
    );
    await allSent(visitor);
    console.log(`Answer lost: all sent after ${Math.round(performance.now() - begun)} ms`);
    expect(await valuesOf(id)).toEqual(FULL);
  });
});

test('the server killed in the middle loses nothing and doubles nothing', {
  timeout: 4 * MINUTES,
}, async () => {
  const { id, path } = await openEngine(CLAUSES);
  const server = await ownServer();
  await server.start();
  try {
    await journey('server killed', async ({ enter }) => {
      const visitor = await enter({ viewport: { width: 1180, height: 820 }, touch: true });
      const { page, context } = visitor;
      const value = await sessionOf(INSPECTOR);
      await context.addCookies([{ name: SESSION_COOKIE, value, url: server.url }]);
      await page.goto(`${server.url}${path}`);
      await sheetReady(page);
      const hand = new Hand(page);
      await hand.read('21');
      await eventually('the first reading on the server', async () =>
        (await valuesOf(id)).length === 1 ? true : undefined,
      );
      // The first answer after this is lost: the server has it, the tablet does not know.
      visitor.expectRefusal({ url: /\/(captures|live|sheet)(\?|$)/, status: 'offline' });
      await page.route(
        '**/captures',
        async (route) => {
          await route.fetch();
          await server.kill();
          await route.abort();
        },
        { times: 1 },
      );
      await hand.read('22');
      await eventually('the second reading on the server', async () =>
        (await valuesOf(id)).length === 2 ? true : undefined,
      );
      for (const digits of BODIES.slice(2)) await hand.read(digits);
      await page.getByText(/entries not sent yet/).waitFor();
      const begun = performance.now();
      await server.start();
      await page.reload();
      await sheetReady(page);
      await allSent(visitor);
      console.log(
        `Server killed: started again and all sent after ${Math.round(performance.now() - begun)} ms`,
      );
      expect(await valuesOf(id)).toEqual(FULL);
    });
  } finally {
    await server.kill();
  }
});
