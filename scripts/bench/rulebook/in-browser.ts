import { readFileSync } from 'node:fs';
import { performance } from 'node:perf_hooks';
import { chromium, type Page, type Request } from 'playwright-core';
import { CLAUSES, content, kib, say, spread } from './book';

interface Product {
  readonly publicUrl: string;
}

const OFFICIAL = 'Ilse Törnkvist';
const KEYS = 'The lifter bore is measured above and below the oil gallery, ';
const READS = 12;

const startedProduct = (): Product | undefined => {
  const file = process.env['TEST_PRODUCT'] ?? 'storage/product.json';
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as Product;
  } catch {
    return undefined;
  }
};

/** From the key's own time stamp to after the frame in which its letter was painted. */
const watchKeys = (page: Page) =>
  page.evaluate(() => {
    const times: number[] = [];
    Object.assign(globalThis, { times });
    addEventListener(
      'input',
      (event) => {
        const from = event.timeStamp;
        requestAnimationFrame(() => {
          const painted = new MessageChannel();
          painted.port1.onmessage = () => times.push(performance.now() - from);
          painted.port2.postMessage(null);
        });
      },
      true,
    );
  });

const typed = async (page: Page, label: string): Promise<void> => {
  const field = page.getByLabel(label, { exact: true });
  await field.click();
  const from = await page.evaluate(
    () => (globalThis as unknown as { times: number[] }).times.length,
  );
  await page.keyboard.type(KEYS, { delay: 40 });
  await page.waitForFunction(
    (n) => (globalThis as unknown as { times: number[] }).times.length >= n,
    from + KEYS.length,
  );
  const times = await page.evaluate(
    (n) => (globalThis as unknown as { times: number[] }).times.slice(n),
    from,
  );
  say(`key to paint, ${label.toLowerCase()} of clause 150`, spread(times));
};

/** A class of its own whose draft is the large book; gives the editor's address. */
const openLargeDraft = async (page: Page, base: string): Promise<string> => {
  await page.goto(`${base}/sign-in/provider`);
  await page.getByRole('button', { name: OFFICIAL }).click();
  await page.waitForURL((url) => url.origin === base);
  await page.goto(`${base}/office`);
  await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
  const name = page.getByLabel(/^New class in season/).first();
  await name.fill(`Bench ${Date.now().toString(36)}`);
  await page.getByRole('button', { name: 'Add it and write its rulebook' }).first().click();
  await page.waitForURL(/\/start$/);
  const file = { format: 'tagwire/rulebook', version: '1', title: 'Bench', ...content };
  const buffer = Buffer.from(JSON.stringify(file));
  const upload = { name: 'bench.json', mimeType: 'application/json', buffer };
  await page.getByLabel('Or from a file').setInputFiles(upload);
  const from = performance.now();
  await page.getByRole('button', { name: 'Start writing' }).click();
  await page.waitForURL(/\/draft\//);
  say('a file taken in, until its editor is there', `${(performance.now() - from).toFixed(0)} ms`);
  return page.url();
};

const benchEditor = async (page: Page, address: string): Promise<void> => {
  const opened: number[] = [];
  for (let i = 0; i < 5; i += 1) {
    const from = performance.now();
    await page.goto(address);
    await page.locator('astro-island:not([ssr])').first().waitFor({ state: 'attached' });
    opened.push(performance.now() - from);
  }
  say('the editor opened, until it answers to the hand', spread(opened));
  await page.locator('.clause-row').nth(150).click();
  await watchKeys(page);
  const answer = page.waitForResponse((one) => one.request().method() === 'PUT');
  await typed(page, 'Heading');
  const saved = await answer;
  await saved.finished();
  const { requestStart, responseEnd } = saved.request().timing();
  const sent = saved.request().postDataBuffer()?.length ?? 0;
  say('a draft sent and kept', `${(responseEnd - requestStart).toFixed(0)} ms for ${kib(sent)}`);
  await typed(page, 'Words');
  await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
};

const publish = async (page: Page): Promise<string> => {
  await page.getByRole('link', { name: 'Check before publishing' }).click();
  const from = performance.now();
  await page.getByRole('button', { name: /^Publish this edition/ }).click();
  await page.getByRole('link', { name: 'As everybody reads it' }).waitFor();
  say('published', `${(performance.now() - from).toFixed(0)} ms`);
  const link = page.getByRole('link', { name: 'As everybody reads it' });
  return new URL((await link.getAttribute('href')) ?? '', page.url()).href;
};

/** The first answer is rendered, the others are served as they are. */
const benchAnswers = async (name: string, address: string): Promise<void> => {
  const times: number[] = [];
  let bytes = 0;
  for (let i = 0; i <= READS; i += 1) {
    const from = performance.now();
    const response = await fetch(address);
    bytes = (await response.arrayBuffer()).byteLength;
    times.push(performance.now() - from);
  }
  const [first = 0, ...later] = times;
  const mean = later.reduce((sum, one) => sum + one, 0) / later.length;
  say(`${name}, first answer`, `${first.toFixed(1)} ms, ${kib(bytes)} unpacked`);
  say(`${name}, the next ${READS}`, `${spread(later)}   ${(first / mean).toFixed(1)} times faster`);
};

const benchReading = async (page: Page, address: string): Promise<void> => {
  const painted: number[] = [];
  let sent = 0;
  for (let i = 0; i < 5; i += 1) {
    const weights: Promise<number>[] = [];
    const weigh = (request: Request) =>
      weights.push(request.sizes().then((one) => one.responseBodySize + one.responseHeadersSize));
    page.on('requestfinished', weigh);
    await page.goto(address);
    await page.waitForLoadState('networkidle');
    page.off('requestfinished', weigh);
    const [paint] = await page.evaluate(() =>
      performance.getEntriesByName('first-contentful-paint').map((one) => one.startTime),
    );
    painted.push(paint ?? 0);
    sent = Math.max(
      sent,
      (await Promise.all(weights)).reduce((sum, one) => sum + one, 0),
    );
  }
  say('the public page, until its first words are painted', spread(painted));
  const [clauses, scripts] = await page.evaluate(() => [
    document.querySelectorAll('article.rule').length,
    document.querySelectorAll('script').length,
  ]);
  say('its weight over the wire, styles and fonts included', kib(sent));
  say('on it', `${clauses} clauses, ${scripts} scripts`);
};

/** What a person feels of a 300-clause rulebook, in Chromium, on the product that `npm start` runs. */
export const benchInBrowser = async (): Promise<void> => {
  const product = startedProduct();
  if (product === undefined) {
    console.info(
      'No product is running: npm start in another window, then once more, for the rest.',
    );
    return;
  }
  const browser = await chromium.launch({
    executablePath: process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium',
    args: ['--headless', '--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage'],
  });
  const viewport = { width: 1280, height: 900 };
  try {
    const page = await browser.newPage({ viewport });
    console.info(`\nIn Chromium ${browser.version()}, ${CLAUSES} clauses\n`);
    const editor = await openLargeDraft(page, product.publicUrl);
    await benchEditor(page, editor);
    const address = await publish(page);
    await benchAnswers('the public page', address);
    await benchAnswers('the printable PDF', `${address}/rulebook.pdf`);
    // Somebody else, with nothing kept from before.
    await benchReading(await browser.newPage({ viewport }), address);
  } finally {
    await browser.close();
  }
};
