import pg from 'pg';
import { expect, test } from 'vitest';
import { journey } from '../support/browser';
import { readProduct } from '../support/product';

const measuringPath = async (): Promise<string> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  const { rows } = await client
    .query<{ id: string }>(
      `select i.id from public.inspection i
       join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
       where e.car_number = '88'`,
    )
    .finally(() => client.end());
  return `/barn/inspections/${rows[0]?.id}/measure`;
};

test.each([
  { width: 1180, height: 820 },
  { width: 820, height: 1180 },
])(
  'a full set with its result fits a tablet of $width × $height without scrolling',
  async (viewport) => {
    const path = await measuringPath();
    await journey(`measuring fits ${viewport.width}`, async ({ enter }) => {
      const visitor = await enter({ viewport, touch: true });
      await visitor.signInAs('Oona Brannick');
      await visitor.open(path);
      const { page } = visitor;
      await page.getByRole('button', { name: 'Bore', exact: true }).click();
      await page
        .getByRole('button', { name: /^5 intake/ })
        .filter({ visible: true })
        .click();
      await page.getByText('What the uncertainty is made of').waitFor();
      await visitor.expectNoSidewaysScroll();
      const tall = await page.evaluate(() => document.documentElement.scrollHeight);
      expect(tall).toBeLessThanOrEqual(viewport.height);
      await visitor.shot(`measuring-${viewport.width}`);
    });
  },
);
