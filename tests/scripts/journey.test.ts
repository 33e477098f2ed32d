import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';
import { listen } from '../../scripts/local/listen.mjs';
import { journey } from '../support/browser';

/** A site that does each wrong thing that a journey has to notice. */
const pages: Record<string, string> = {
  '/sound': '<main><h1>Sound</h1></main>',
  '/console': '<script src="/console.js"></script>',
  '/thrown': '<script src="/thrown.js"></script>',
  '/refused': '<script src="/fetch.js"></script>',
  '/policy': '<script>document.title = "never"</script>',
  '/unlabelled': '<main><h1>Form</h1><input></main>',
  '/wide':
    '<main><h1>Wide</h1><svg width="3000" height="10" role="img" aria-label="bar"></svg></main>',
};
const scripts: Record<string, string> = {
  '/console.js': 'console.error("it broke")',
  '/thrown.js': 'throw new Error("thrown on purpose")',
  '/fetch.js': 'fetch("/missing").then(() => { document.title = "asked"; })',
};

const site = await listen(0, (request, response) => {
  const path = request.url ?? '';
  const script = scripts[path];
  const body = pages[path];
  response.setHeader('content-security-policy', "default-src 'self'; img-src data:");
  if (script !== undefined) {
    response.writeHead(200, { 'content-type': 'text/javascript' }).end(script);
  } else if (body !== undefined) {
    response
      .writeHead(200, { 'content-type': 'text/html' })
      .end(
        `<!doctype html><html lang="en"><head><title>${path}</title><link rel="icon" href="data:,"></head><body>${body}</body></html>`,
      );
  } else {
    response.writeHead(404, { 'content-type': 'text/plain' }).end('no');
  }
});
const folder = mkdtempSync(join(tmpdir(), 'tagwire-journey-'));
const productFile = join(folder, 'product.json');
writeFileSync(productFile, JSON.stringify({ publicUrl: site.url, people: [] }));
process.env['TEST_PRODUCT'] = productFile;

afterAll(async () => {
  await site.stop();
  rmSync(folder, { recursive: true, force: true });
});

const visit = (path: string) =>
  journey(path, async ({ enter }) => {
    const visitor = await enter();
    await visitor.open(path);
    if (path === '/refused') await visitor.page.waitForFunction(() => document.title === 'asked');
  });

test('a sound page passes', async () => {
  await visit('/sound');
});

test.each<readonly [path: string, complaint: string | RegExp]>([
  ['/console', 'console: it broke'],
  ['/thrown', 'page: thrown on purpose'],
  ['/refused', `request: 404 for ${site.url}/missing`],
  // The browser's own line and the page's event come in either order.
  ['/policy', /refused inline|violates the following Content Security Policy/],
])('%s fails its journey', async (path, complaint) => {
  await expect(visit(path)).rejects.toThrow(complaint);
});

test('a refusal that is expected passes, and one that does not come fails', async () => {
  await journey('expected', async ({ enter }) => {
    const visitor = await enter();
    visitor.expectRefusal({ url: /\/missing$/, status: 404 });
    await visitor.open('/refused');
    await visitor.page.waitForFunction(() => document.title === 'asked');
  });
  const inVain = journey('in vain', async ({ enter }) => {
    const visitor = await enter();
    visitor.expectRefusal({ url: /\/missing$/, status: 403 });
    await visitor.open('/sound');
  });
  await expect(inVain).rejects.toThrow('expected but did not happen: 403');
});

test('an input without a label and a page wider than the window are told', async () => {
  const unlabelled = journey('unlabelled', async ({ enter }) => {
    const visitor = await enter();
    await visitor.open('/unlabelled');
    await visitor.expectAccessible();
  });
  await expect(unlabelled).rejects.toThrow('Form elements must have labels');
  const wide = journey('wide', async ({ enter }) => {
    const visitor = await enter({ viewport: { width: 360, height: 740 } });
    await visitor.open('/wide');
    await visitor.expectNoSidewaysScroll();
  });
  await expect(wide).rejects.toThrow('width of');
});
