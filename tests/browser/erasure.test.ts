import pg from 'pg';
import { expect, it } from 'vitest';
import { journey } from '../support/browser';
import { readProduct } from '../support/product';

it('an official holds a paperwork, cannot erase it then, and lifts the hold; its owner sees the receipt as a code', async () => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  const { rows } = await client
    .query<{ id: string; inspected: boolean; owner: string }>(
      `select p.id, o.name as owner, exists (select from public.inspection i where i.paperwork_id = p.id) as inspected
       from public.paperwork p join public.person o on o.id = p.competitor_id
       where p.state in ('handed-in', 'accepted') order by o.name = 'Wren Halloway' desc, inspected, p.id`,
    )
    .finally(() => client.end());
  const [first] = rows;
  if (first === undefined) throw new Error('The demo has no paperwork that was handed in.');
  await journey('hold and receipt', async ({ enter }) => {
    const official = await enter({ viewport: { width: 1280, height: 900 } });
    await official.signInAs('Ilse Törnkvist');
    const path = `/office/paperwork/${first.id}/erase`;
    await official.open(path);
    const { page } = official;
    const erase = page.getByRole('button', { name: 'Erase for good' });
    expect(await erase.count()).toBe(first.inspected ? 0 : 1);
    await page.getByLabel('Reason').fill('A protest on this car is open.');
    await page.getByRole('button', { name: /Put on hold/ }).click();
    await page.getByText('A protest on this car is open.').waitFor();
    expect(await erase.count()).toBe(0);
    await official.expectAccessible();
    await official.shot('held');
    await page.getByRole('button', { name: 'Lift this hold' }).click();
    await page.getByText('A protest on this car is open.').waitFor({ state: 'detached' });
    expect(await erase.count()).toBe(first.inspected ? 0 : 1);

    const owner = await enter({ viewport: { width: 360, height: 780 } });
    await owner.signInAs(first.owner);
    await owner.open(`/paddock/paperwork/${first.id}`);
    await owner.page.getByText('Receipt as a code').click();
    await owner.page.getByRole('img', { name: /^Receipt of paperwork/ }).waitFor();
    await owner.expectNoSidewaysScroll();
    await owner.expectAccessible();
    await owner.shot('receipt');
  });
}, 60_000);
