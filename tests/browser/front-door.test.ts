import { expect, test } from 'vitest';
import { journey } from '../support/browser';

test.each([
  { width: 360, height: 740 },
  { width: 1280, height: 800 },
])('the front page is sound at $width px and ships no script', async (viewport) => {
  await journey(`front page ${viewport.width}`, async ({ enter }) => {
    const visitor = await enter({ viewport });
    await visitor.open('/');
    expect(await visitor.page.locator('h1').count()).toBe(1);
    expect(await visitor.page.locator('script').count()).toBe(0);
    await visitor.expectNoSidewaysScroll();
    await visitor.expectAccessible();
    await visitor.shot(`front-page-${viewport.width}`);
  });
});

test('an address that does not exist gets a page that says so', async () => {
  await journey('no such page', async ({ enter }) => {
    const visitor = await enter();
    visitor.expectRefusal({ url: /\/no\/such\/page$/, status: 404 });
    await visitor.open('/no/such/page');
    await visitor.expectAccessible();
  });
});
