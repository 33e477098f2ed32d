import { createHash } from 'node:crypto';
import pg from 'pg';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { MOST_AT_ONCE, PART_BYTES } from '@/domain/paperwork/file/limits';
import { journey, type Visitor } from '../support/browser';
import { startDroppingLink } from '../support/dropping-link';
import { heicFixture } from '../support/hostile/pictures';
import { readProduct } from '../support/product';
import { eventually } from '../support/wait';

const MINUTES = 60_000;
const PHONE = { viewport: { width: 390, height: 844 }, touch: true };

interface Picture {
  readonly name: string;
  readonly mimeType: string;
  readonly buffer: Buffer;
}

const sha256Of = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

/** Every picture another one; noise, so that it has the weight of a photograph. */
const picture = async (at: number, side: number): Promise<Picture> => ({
  name: `photograph ${at}.jpg`,
  mimeType: 'image/jpeg',
  buffer: await sharp({
    create: {
      width: side,
      height: Math.round(side * 0.75),
      channels: 3,
      background: '#777',
      noise: { type: 'gaussian', mean: 100 + at, sigma: 60 },
    },
  })
    .jpeg({ quality: 96 })
    .toBuffer(),
});

const twelve = async (): Promise<readonly Picture[]> => [
  ...(await Promise.all(Array.from({ length: 9 }, (_, at) => picture(at + 1, 1_000)))),
  await picture(10, 4_000),
  await picture(11, 4_000),
  { name: 'photograph 12.heic', mimeType: 'image/heic', buffer: heicFixture('rack') },
];

const begin = async ({ page, open }: Visitor): Promise<string> => {
  await open('/paddock/paperwork/new');
  const wanted = await page
    .getByLabel('Class', { exact: true })
    .locator('option', { hasText: 'Street Eight' })
    .first()
    .getAttribute('value');
  await page.getByLabel('Class', { exact: true }).selectOption(wanted ?? '');
  await page.getByLabel('Car number').fill('88');
  await page.locator('input[name="engine"][value="new"]').check();
  await page.getByLabel('Your name for it').fill(`Link ${Date.now().toString(36)}`);
  await page.getByLabel('Block casting number').fill('41-7730');
  await page.getByRole('button', { name: 'Begin the paperwork' }).click();
  await page.waitForURL(/\/paddock\/paperwork\/[0-9a-f-]{36}$/);
  await ready(page);
  return new URL(page.url()).pathname.split('/').at(-1) ?? '';
};

const ready = (page: Visitor['page']) => page.locator('[data-ready="yes"]').waitFor();

test(
  'twelve photographs from a phone over a link that drops twice arrive, each once',
  async () => {
    const link = await startDroppingLink(6_000_000);
    const pictures = await twelve();
    const total = pictures.reduce((sum, { buffer }) => sum + buffer.length, 0);
    expect(pictures.filter(({ buffer }) => buffer.length > MOST_AT_ONCE).length).toBe(2);
    try {
      await journey('twelve photographs', async ({ enter }) => {
        const phone = await enter({ ...PHONE, proxy: link.url });
        const { page } = phone;
        await phone.signInAs('Wren Halloway');
        const paperworkId = await begin(phone);
        phone.expectRefusal({ url: /./, status: 'offline' });

        const firstDrop = link.dropAfter(1_500_000);
        const [chooser] = await Promise.all([
          page.waitForEvent('filechooser'),
          page
            .locator('button')
            .and(page.getByRole('button', { name: /^(Photograph|Add another)/ }))
            .first()
            .click(),
        ]);
        await chooser.setFiles([...pictures]);
        await firstDrop;
        await page.getByText('No signal: goes on by itself', { exact: true }).first().waitFor();
        await phone.shot('uploads-no-signal');
        await phone.expectNoSidewaysScroll();
        await phone.expectAccessible();

        const secondDrop = link.dropAfter(9_000_000);
        link.restore();
        await secondDrop;
        await page.getByText('No signal: goes on by itself', { exact: true }).first().waitFor();
        link.restore();

        // It goes on by itself; then a person pauses all of it and the page is loaded anew.
        await page
          .getByText(/^Sending \d+ %$/)
          .first()
          .waitFor();
        await page.getByRole('button', { name: 'Pause all' }).click();
        await page
          .getByText(/^Paused/)
          .first()
          .waitFor();
        await phone.shot('uploads-paused');
        const paused = await page.getByText(/^Paused/).count();
        await page.reload();
        await ready(page);
        await page
          .getByText(/^Paused/)
          .nth(paused - 1)
          .waitFor();
        expect(await page.getByText(/^Paused/).count()).toBe(paused);
        await page
          .getByRole('button', { name: /^Go on/ })
          .last()
          .waitFor();
        const all = page.getByRole('button', { name: 'Go on with all' });
        await ((await all.count()) > 0
          ? all
          : page.getByRole('button', { name: /^Go on/ })
        ).click();

        for (const { name } of pictures)
          await page
            .getByRole('button', { name: `Take out ${name}`, exact: true })
            .waitFor({ timeout: 90_000 });
        await phone.shot('uploads-all-sent');
        await phone.expectNoSidewaysScroll();
        await page
          .getByText(/^Sent \d\d:\d\d$/)
          .nth(11)
          .waitFor();

        const client = new pg.Client({ connectionString: readProduct().superuserUrl });
        await client.connect();
        try {
          const { rows } = await client.query<{ sha256: string; state: string }>(
            `select encode(sha256, 'hex') as sha256, state from public.file where paperwork_id = $1`,
            [paperworkId],
          );
          expect(rows.map(({ state }) => state)).toEqual(pictures.map(() => 'kept'));
          expect(rows.map(({ sha256 }) => sha256).sort()).toEqual(
            pictures.map(({ buffer }) => sha256Of(buffer)).sort(),
          );
          await eventually('previews of all of them', async () => {
            const made = await client.query(
              'select 1 from public.file where paperwork_id = $1 and previews is not null',
              [paperworkId],
            );
            return made.rowCount === pictures.length ? true : undefined;
          });
        } finally {
          await client.end();
        }
        const left = await page.evaluate(
          () =>
            new Promise<number>((resolve) => {
              const asked = indexedDB.open('tagwire-uploads');
              asked.onsuccess = () => {
                const count = asked.result.transaction('bytes').objectStore('bytes').count();
                count.onsuccess = () => resolve(count.result);
              };
            }),
        );
        expect(left, 'files still on the phone').toBe(0);
      });
      console.info(
        `12 files, ${total} bytes; ${link.sent()} bytes went up, ${((link.sent() / total) * 100).toFixed(1)} %.`,
      );
      // Two drops and one pause, two files on their way each time, cost at most what was on its way.
      expect(link.sent()).toBeGreaterThanOrEqual(total);
      expect(link.sent()).toBeLessThan(total + 3 * 2 * PART_BYTES);
    } finally {
      await link.stop();
    }
  },
  5 * MINUTES,
);
