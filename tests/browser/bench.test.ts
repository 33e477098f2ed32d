import { expect, test } from 'vitest';
import { clearanceExample } from '@/components/bench/forms/clearance';
import { compressionExample } from '@/components/bench/forms/compression';
import { sizesExamples } from '@/components/bench/forms/sizes';
import { temperatureExample } from '@/components/bench/forms/temperature';
import { uncertaintyExample } from '@/components/bench/forms/uncertainty';
import { journey } from '../support/browser';
import { readProduct } from '../support/product';

const phone = { width: 360, height: 740 };
const desk = { width: 1280, height: 800 };

test.each([phone, desk])(
  'every calculator is sound at $width px without scripts',
  async (viewport) => {
    await journey(`bench ${viewport.width}`, async ({ enter }) => {
      const visitor = await enter({ viewport });
      for (const path of [
        '/bench',
        `/bench/clearance${clearanceExample}&tbore=60+C&tlifter=20+C`,
        '/bench/decision?value=0.0018&unit=in&u=0.00004&min=0.0013&max=0.0019&rule=guarded-acceptance',
        `/bench/uncertainty${uncertaintyExample}`,
        '/bench/displacement?unit=in&bore=4.065&stroke=3.480&cylinders=8&round=up&ubore=0.0003',
        `/bench/compression${compressionExample}`,
        '/bench/cam?of=events&intakeOpens=6&intakeCloses=42&exhaustOpens=48&exhaustCloses=12',
        `/bench/temperature${temperatureExample}`,
        `/bench/sizes${sizesExamples.weights}`,
      ]) {
        await visitor.open(path);
        expect(await visitor.page.locator('h1').count(), path).toBe(1);
        expect(await visitor.page.locator('script').count(), path).toBe(0);
        if (path !== '/bench')
          expect(await visitor.page.locator('.sheet-live h2').count(), path).toBe(1);
        await visitor.expectNoSidewaysScroll();
        await visitor.expectAccessible();
        await visitor.shot(
          `bench-${viewport.width}-${path.split('?')[0]?.split('/')[2] ?? 'list'}`,
        );
      }
    });
  },
);

test('a visitor without scripts works out a compression ratio and follows its link', async () => {
  await journey('bench form', async ({ enter }) => {
    const { page, open } = await enter({ javaScript: false });
    await open('/bench/compression');
    const sizes = {
      Bore: '4.030',
      Stroke: '3.480',
      'Deck clearance': '0.025',
      'Chamber volume': '64',
      Piston: '6',
      'Gasket bore': '4.100',
      'Gasket thickness': '0.039',
    };
    for (const [label, value] of Object.entries(sizes)) {
      await page.getByLabel(label, { exact: true }).fill(value);
    }
    await page.getByRole('button', { name: 'Work it out' }).click();
    await page.waitForURL(/gasketThickness=0\.039/);
    expect(await page.locator('.sheet-live').textContent()).toContain('9.69 to 1');
    expect(await page.getByLabel('Bore', { exact: true }).inputValue()).toBe('4.030');
    await page.getByRole('link', { name: 'Link to this result' }).click();
    expect(await page.locator('.sheet-live').textContent()).toContain('9.69 to 1');
  });
});

test('what is wrong is said at its field, and what was typed is kept', async () => {
  await journey('bench faults', async ({ enter }) => {
    const visitor = await enter({ viewport: phone });
    visitor.expectRefusal({ url: /\/bench\/displacement\?/, status: 422 });
    await visitor.open('/bench/displacement?unit=in&bore=four&stroke=3.480&cylinders=8');
    const bore = visitor.page.getByLabel('Bore', { exact: true });
    expect(await bore.inputValue()).toBe('four');
    expect(await bore.getAttribute('aria-invalid')).toBe('true');
    const told = await bore.getAttribute('aria-describedby');
    expect(await visitor.page.locator(`#${told}`).textContent()).toContain(
      '"four" is not a number',
    );
    await visitor.expectAccessible();
    await visitor.page.getByRole('link', { name: /^Bore:/ }).click();
    expect(await visitor.page.evaluate(() => document.activeElement?.id)).toBe('bore');
  });
});

test('the same over the API of the started product, faults as problem details', async () => {
  const { publicUrl } = readProduct();
  const post = (path: string, body: string) =>
    fetch(`${publicUrl}/api/bench/${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body,
    });
  const events = { intakeOpens: '6', intakeCloses: '42', exhaustOpens: '48', exhaustCloses: '12' };
  const good = await post('engine', JSON.stringify({ quantity: 'valve-events', inputs: events }));
  expect(good.status).toBe(200);
  expect(await good.json()).toMatchObject({ overlap: '18', intakeDuration: '228' });
  const bad = await post('study', JSON.stringify({ method: 'wilson', data: { count: 5, n: 4 } }));
  expect(bad.status).toBe(422);
  expect(bad.headers.get('content-type')).toContain('application/problem+json');
  expect(await bad.json()).toMatchObject({ errors: [{ pointer: '/data/count' }] });
  expect((await post('study', '{')).status).toBe(400);
});
