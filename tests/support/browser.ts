import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { AxeBuilder } from '@axe-core/playwright';
import { type BrowserContext, chromium, type Page } from 'playwright-core';
import { expect } from 'vitest';
import { readProduct } from './product';
import { type Expected, watch } from './watch';

export const flags: readonly string[] = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
];

export interface VisitorOptions {
  /** CSS pixels; default 1280 × 800. */
  readonly viewport?: { readonly width: number; readonly height: number };
  readonly javaScript?: boolean;
  readonly touch?: boolean;
  readonly reducedMotion?: 'reduce' | 'no-preference';
  /** Everything goes through this HTTP proxy. */
  readonly proxy?: string;
}

/** One person at a browser of their own, with cookies and storage of their own. */
export interface Visitor {
  readonly page: Page;
  readonly context: BrowserContext;
  /** Allows one kind of failed request from now on, and demands that it happens. */
  readonly expectRefusal: (expected: Expected) => void;
  /** Opens a path of the product. */
  readonly open: (path: string) => Promise<void>;
  /** Signs in as one of the demo people through the identity provider. */
  readonly signInAs: (name: string) => Promise<void>;
  /** Checks the page against WCAG 2.2 A and AA. */
  readonly expectAccessible: () => Promise<void>;
  /** Checks that nothing sticks out sideways. */
  readonly expectNoSidewaysScroll: () => Promise<void>;
  /** Keeps a picture, where `TEST_SHOTS` names a folder. */
  readonly shot: (name: string) => Promise<void>;
}

export interface Stage {
  readonly enter: (options?: VisitorOptions) => Promise<Visitor>;
}

const shotsFolder = () => process.env['TEST_SHOTS'] ?? '';

class Faults extends Error {}

/** @throws Faults naming each of them, when there are any */
function demandNone(where: string, faults: readonly string[]): void {
  if (faults.length > 0) throw new Faults(`Faults in ${where}:\n  ${faults.join('\n  ')}`);
}

async function openVisitor(options: VisitorOptions) {
  const folder = mkdtempSync(join(tmpdir(), 'tagwire-browser-'));
  const context = await chromium.launchPersistentContext(folder, {
    executablePath: process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium',
    args: [...flags],
    headless: true,
    viewport: options.viewport ?? { width: 1280, height: 800 },
    javaScriptEnabled: options.javaScript ?? true,
    hasTouch: options.touch ?? false,
    reducedMotion: options.reducedMotion ?? 'reduce',
    acceptDownloads: true,
    // Without the bypass a browser goes to its own machine past every proxy.
    ...(options.proxy && { proxy: { server: options.proxy, bypass: '<-loopback>' } }),
    timeout: 60_000,
  });
  context.setDefaultTimeout(30_000);
  const { expectRefusal, problems } = watch(context);
  const page = context.pages()[0] ?? (await context.newPage());
  const { publicUrl } = readProduct();

  const shot = async (picture: string) => {
    if (shotsFolder() === '') return;
    mkdirSync(shotsFolder(), { recursive: true });
    await page.screenshot({ path: join(shotsFolder(), `${picture}.png`), fullPage: true });
  };
  const visitor: Visitor = {
    page,
    context,
    expectRefusal,
    shot,
    open: async (path) => {
      await page.goto(new URL(path, publicUrl).href);
    },
    signInAs: async (person) => {
      await page.goto(`${publicUrl}/sign-in/provider`);
      await page.getByRole('button', { name: person }).click();
      await page.waitForURL((url) => url.origin === publicUrl);
    },
    expectAccessible: async () => {
      const found = await new AxeBuilder({ page })
        .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
        .analyze();
      demandNone(
        `accessibility of ${page.url()}`,
        found.violations.map(
          ({ id, help, nodes }) =>
            `${id}: ${help}\n    ${nodes.map(({ html }) => html).join('\n    ')}`,
        ),
      );
    },
    expectNoSidewaysScroll: async () => {
      const [content, window] = await page.evaluate(() => [
        document.documentElement.scrollWidth,
        document.documentElement.clientWidth,
      ]);
      expect(content, `width of ${page.url()}`).toBeLessThanOrEqual(window ?? 0);
    },
  };
  const close = async () => {
    await context.close();
    rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
  };
  return { visitor, problems, close, shot };
}

/**
 * Walks through the product in real browsers. It fails, beyond what the walk itself asserts, on any
 * console error, page error, breach of the content security policy, or request that failed or was
 * refused without being expected.
 *
 * @param name of the journey; names the picture taken when it fails
 */
export async function journey(name: string, walk: (stage: Stage) => Promise<void>): Promise<void> {
  const open: Awaited<ReturnType<typeof openVisitor>>[] = [];
  const told = () => open.flatMap(({ problems }) => problems());
  try {
    await walk({
      enter: async (options = {}) => {
        const opened = await openVisitor(options);
        open.push(opened);
        return opened.visitor;
      },
    });
    demandNone(`the browser during "${name}"`, told());
  } catch (error) {
    for (const [at, { shot }] of open.entries()) {
      await shot(`failed-${name.replace(/[^a-z0-9]+/gi, '-')}-${at + 1}`).catch(() => undefined);
    }
    // A walk that fails by itself often fails because of these.
    if (!(error instanceof Faults) && told().length > 0) {
      console.error(`In the browser during "${name}":\n${told().join('\n')}`);
    }
    throw error;
  } finally {
    for (const { close } of open) await close();
  }
}
