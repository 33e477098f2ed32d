import pg from 'pg';
import { expect, test } from 'vitest';
import { joinCodes } from '@/domain/inspection/witness/readings-codes';
import { journey, type Visitor } from '../../support/browser';
import { readProduct } from '../../support/product';
import { readCode } from '../../support/read-code';

const query = async <R extends object>(sql: string): Promise<readonly R[]> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  return (await client.query<R>(sql).finally(() => client.end())).rows;
};

const inspectionOf = async (car: string) => {
  const [row] = await query<{ id: string }>(
    `select i.id from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     where e.car_number = '${car}' order by i.picked_at limit 1`,
  );
  return row?.id ?? '';
};

const words = async ({ page }: Visitor): Promise<string> =>
  ((await page.locator('main').textContent()) ?? '').replace(/\s+/g, ' ');

/** Every code of the page, one after another, as a phone reads them. */
const readCodes = async ({ page }: Visitor): Promise<readonly string[]> => {
  const codes: string[] = [];
  for (;;) {
    const shown = page.getByRole('img', { name: /^Readings, code \d+ of \d+$/ });
    codes.push(await readCode(shown));
    const next = page.getByRole('button', { name: 'Next code' });
    if ((await next.count()) === 0 || (await next.isDisabled())) return codes;
    await next.click();
  }
};

test.each([
  { width: 1180, height: 820 },
  { width: 820, height: 1180 },
])(
  'the competitor’s side sees the findings and takes every mandatory reading along without signal, $width × $height',
  async (viewport) => {
    const inspection = await inspectionOf('12J');
    await journey(`codes ${viewport.width}`, async ({ enter }) => {
      const visitor = await enter({ viewport, touch: true });
      await visitor.signInAs('Oona Brannick');
      await visitor.open(`/barn/inspections/${inspection}/witness`);
      const { page, context } = visitor;
      await page.getByRole('list', { name: 'Findings' }).waitFor();
      const said = await words(visitor);
      expect(said).toContain('0.0063 in');
      expect(said).toMatch(/outside: fail/);
      await context.setOffline(true);
      const codes = await readCodes(visitor);
      await context.setOffline(false);
      expect(codes.length).toBeGreaterThan(1);
      const lines = joinCodes(codes) ?? [];
      const kept = await query<{ quantity: string; text: string; cylinder: string; valve: string }>(
        `select r.quantity, r.value_text as text, r.cylinder, r.valve from record.reading r
         where r.inspection_id = '${inspection}' and r.standing = 'accepted'
           and r.quantity in ('lifter-body-diameter', 'foot-diameter') order by r.occurred_at`,
      );
      expect(kept.length).toBe(96);
      for (const [quantity, label] of [
        ['lifter-body-diameter', 'Lifter body diameter'],
        ['foot-diameter', 'Lifter foot diameter'],
      ] as const) {
        const from = lines.findIndex((line) => line.startsWith(label));
        const own = lines.slice(from + 1, from + 18);
        for (const bore of new Set(kept.map(({ cylinder, valve }) => `${cylinder} ${valve}`))) {
          const texts = kept
            .filter((row) => row.quantity === quantity && `${row.cylinder} ${row.valve}` === bore)
            .map(({ text }) => text);
          expect(own).toContain(`${bore}: ${texts.join(' ')}`);
        }
      }
      expect(lines.at(-1)).toMatch(/: (pass|FAIL|no finding)$/);
      await visitor.expectNoSidewaysScroll();
      await visitor.expectAccessible();
      await visitor.shot(`witness-${viewport.width}`);
      await page.getByRole('link', { name: 'On paper' }).click();
      await page.getByRole('heading', { name: 'Readings behind the mandatory clauses' }).waitFor();
      const paper: string[] = [];
      for (const code of await page.getByRole('img', { name: /^Readings, code/ }).all())
        paper.push(await readCode(code));
      expect(joinCodes(paper)?.slice(2)).toEqual(lines.slice(2));
      await visitor.shot(`readings-${viewport.width}`);
      await page.getByRole('link', { name: 'For 80 mm paper' }).click();
      await page.emulateMedia({ media: 'print' });
      await visitor.shot(`readings-slip-${viewport.width}`);
    });
  },
);

test('without signal: an own reading is written down and a refusal recorded; the ring is tried before both sides', async () => {
  const inspection = await inspectionOf('88');
  const findings = () =>
    query<{ n: string }>(
      `select count(*) as n from record.reading where inspection_id = '${inspection}'`,
    );
  const before = await findings();
  await journey('the witness', async ({ enter }) => {
    const visitor = await enter({ viewport: { width: 1180, height: 820 }, touch: true });
    const { page, context } = visitor;
    await visitor.signInAs('Oona Brannick');
    await visitor.open(`/barn/inspections/${inspection}`);
    await page.getByRole('link', { name: 'Turn to the competitor’s side' }).click();
    await page.getByRole('link', { name: 'Check DB-07 on the ring' }).click();
    await page.getByLabel('It reads').fill('0.0000 0.0001');
    await page.getByLabel(/^Before whom/).fill('Linnea Farrow');
    await page.getByRole('button', { name: 'Record the check' }).click();
    await page.getByText(/checked on the ring SR-03 at \d\d:\d\d, off by 0.0001 in/).waitFor();
    await page.locator('.saved-line').waitFor();

    visitor.expectRefusal({ url: /\/captures$/, status: 'offline' });
    await context.setOffline(true);
    await page.getByText('Have your own reading written down').click();
    await page.getByRole('button', { name: 'Write it down' }).click();
    await page.getByRole('alert').waitFor();
    await page.getByLabel('What', { exact: true }).selectOption('lifter-body-diameter');
    await page.getByLabel('Where', { exact: true }).selectOption('1 intake');
    await page.getByLabel(/^Read, in/).fill('0,8419');
    await page.getByRole('button', { name: 'Write it down' }).click();
    await page.getByRole('list', { name: 'Own readings' }).getByText('0.8419 in').waitFor();
    await page.getByLabel('Your name').fill('Linnea Farrow');
    await page.getByLabel('What you want written down').fill('The block was hot.');
    await page.getByRole('button', { name: 'Refuses to sign' }).click();
    await page.getByText('refused to sign').first().waitFor();
    const codes = joinCodes(await readCodes(visitor));
    expect(codes?.join('\n')).toContain('Lifter body diameter');
    expect(codes?.join('\n')).not.toContain('0.8419');
    await page.locator('.saved-line', { hasText: 'On this tablet' }).waitFor();
    await visitor.shot('witness-offline');
    await context.setOffline(false);
    await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();

    await page.getByRole('link', { name: 'Back to the inspector’s page' }).click();
    await page.getByText('has seen the findings and refused to sign').waitFor();
    expect(await words(visitor)).toContain('The block was hot.');
    await page.getByRole('link', { name: 'Readings to take along' }).click();
    await page.getByRole('heading', { name: 'Readings behind the mandatory clauses' }).waitFor();
    expect(await words(visitor)).toMatch(/own readings[\s\S]*0\.8419 in, by/i);
  });
  const own = await query<{ subject: string; value: string; reason: string }>(
    `select subject, answer ->> 'value' as value, reason from record.remark
     where inspection_id = '${inspection}' and kind = 'own-reading'`,
  );
  expect(own.map(({ subject, value }) => [subject, value])).toEqual([
    ['lifter-body-diameter', '0.8419 in'],
  ]);
  expect(await findings()).toEqual(before);
});
