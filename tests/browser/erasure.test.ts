import { createHash } from 'node:crypto';
import jsQr from 'jsqr';
import pg from 'pg';
import sharp from 'sharp';
import { expect, it } from 'vitest';
import { journey } from '../support/browser';
import { readProduct } from '../support/product';

interface Found {
  readonly id: string;
  readonly inspected: boolean;
  readonly owner: string;
}

const ask = async <T extends pg.QueryResultRow>(sql: string, values: unknown[] = []) => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  try {
    return (await client.query<T>(sql, values)).rows;
  } finally {
    await client.end();
  }
};

const findPaperwork = async (where: string): Promise<Found> => {
  const [first] = await ask<Found>(
    `select p.id, o.name as owner, exists (select from public.inspection i where i.paperwork_id = p.id) as inspected
     from public.paperwork p join public.person o on o.id = p.competitor_id
     where ${where} order by p.id limit 1`,
  );
  if (first === undefined) throw new Error(`The demo has no paperwork ${where}.`);
  return first;
};

/** What a telephone reads off a picture of the screen; nothing if it finds no code. */
const readCode = async (picture: Buffer): Promise<string | undefined> => {
  const { data, info } = await sharp(picture)
    .ensureAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return jsQr(new Uint8ClampedArray(data), info.width, info.height)?.data;
};

it('an official holds a paperwork, cannot erase it then, and lifts the hold; its owner reads the receipt off the screen without signal', async () => {
  const first = await findPaperwork("p.state = 'accepted' and o.name = 'Wren Halloway'");
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
    await owner.context.setOffline(true);
    await owner.page.getByText('Receipt as a code').click();
    const code = owner.page.getByRole('img', { name: /^Receipt of paperwork/ });
    const text = await readCode(await code.screenshot());
    await owner.context.setOffline(false);
    await owner.expectNoSidewaysScroll();
    await owner.expectAccessible();
    await owner.shot('receipt');

    // What the code says is enough to check a copy of the document, and to find its line.
    const said = /^Tagwire receipt\n.+\n.+\nLedger line (\d+)\n(\S+)\nSHA-256 ([0-9a-f]{64})$/.exec(
      text ?? '',
    );
    expect(text).not.toContain('http');
    const [, line, at, hash] = said ?? [];
    const [kept] = await ask<{ document: string; line: string }>(
      `select v.document, l.line from record.paperwork_version v
       join record.ledger_line l on l.series_id = v.series_id and l.act_id = v.act_id
       where v.paperwork_id = $1 and l.index = $2`,
      [first.id, line],
    );
    expect(
      createHash('sha256')
        .update(kept?.document ?? '')
        .digest('hex'),
    ).toBe(hash);
    expect(JSON.parse(kept?.line ?? '{}')).toMatchObject({ index: line, refs: { hash } });
    expect(Number.isNaN(Date.parse(at ?? ''))).toBe(false);
  });
}, 90_000);

it('an official erases for good what was handed in and never inspected; the page says so, to its owner too', async () => {
  const { id, owner } = await findPaperwork(
    `p.state = 'handed-in' and o.name = 'Ysolde Kerrigan' and not exists
       (select from public.inspection i where i.paperwork_id = p.id)`,
  );
  const [before] = await ask<{ document: string }>(
    'select document from record.paperwork_version where paperwork_id = $1 order by number desc',
    [id],
  );
  expect(before?.document).toContain('photographs');
  const reason = 'Handed in for the wrong class; the owner asked for it.';
  await journey('erase for good', async ({ enter }) => {
    const official = await enter({ viewport: { width: 1280, height: 900 } });
    await official.signInAs('Ilse Törnkvist');
    await official.open(`/office/paperwork/${id}/erase`);
    const { page } = official;
    await page.getByText('This cannot be undone').waitFor();
    official.expectRefusal({ status: 422, url: /\/erase$/ });
    await page.getByRole('button', { name: 'Erase for good' }).click();
    await page.getByText('Say in 10 to 500 characters').first().waitFor();
    await page.getByLabel('Reason').fill(reason);
    await official.shot('erase');
    await page.getByRole('button', { name: 'Erase for good' }).click();
    await page.getByText(/^Erased /).waitFor();
    expect(await page.getByText(reason).count()).toBe(1);
    expect(await page.getByRole('button', { name: 'Erase for good' }).count()).toBe(0);
    await official.expectAccessible();
    await official.shot('erased');

    const competitor = await enter({ viewport: { width: 360, height: 780 } });
    await competitor.signInAs(owner);
    await competitor.open(`/paddock/paperwork/${id}`);
    await competitor.page.getByText(/^Erased /).waitFor();
    await competitor.expectNoSidewaysScroll();
    await competitor.expectAccessible();
    await competitor.shot('erased-owner');
  });
  expect(
    await ask(
      'select 1 from record.paperwork_version where paperwork_id = $1 and document is not null',
      [id],
    ),
  ).toEqual([]);
}, 90_000);

it('an official holds an inspection: its pen strokes cannot be erased until the hold is lifted', async () => {
  const [signed] = await ask<{ id: string }>(
    'select inspection_id as id from record.signature_strokes where strokes is not null order by 1 limit 1',
  );
  if (signed === undefined) throw new Error('The demo has no pen strokes.');
  await journey('hold an inspection', async ({ enter }) => {
    const official = await enter({ viewport: { width: 820, height: 1180 } });
    await official.signInAs('Ilse Törnkvist');
    await official.open(`/office/strokes/${signed.id}`);
    const { page } = official;
    const erase = page.getByRole('button', { name: 'Erase the strokes for good' });
    await erase.waitFor();
    await page.getByLabel('Reason').fill('The appeal of this car is open.');
    await page.getByRole('button', { name: /Put on hold/ }).click();
    await page.getByText('This inspection, since').waitFor();
    expect(await erase.count()).toBe(0);
    await official.expectAccessible();
    await official.shot('inspection-held');
    await page.getByRole('button', { name: 'Lift this hold' }).click();
    await erase.waitFor();
    expect(await page.getByText('This inspection, since').count()).toBe(0);
  });
}, 90_000);

it('an official sets how long the names and reasons of an event’s day are kept', async () => {
  const [series] = await ask<{ slug: string }>(
    `select s.slug from public.series s
     join public.membership m on m.series_id = s.id and m.role = 'official' and m.ended_at is null
     join public.person p on p.id = m.person_id
     where p.name = 'Ilse Törnkvist' order by 1 limit 1`,
  );
  await journey('retention', async ({ enter }) => {
    const official = await enter({ viewport: { width: 390, height: 844 } });
    await official.signInAs('Ilse Törnkvist');
    await official.open(`/office/retention/${series?.slug}`);
    const { page } = official;
    const choice = page.getByLabel('Names and reasons of an event’s day');
    for (const kept of ['season-end', 'keep']) {
      await choice.selectOption(kept);
      await page.getByRole('button', { name: 'Save' }).click();
      await page.locator(`select[name="dayWords"] option[value="${kept}"][selected]`).waitFor({
        state: 'attached',
      });
    }
    await official.expectNoSidewaysScroll();
    await official.expectAccessible();
    await official.shot('retention');
  });
}, 60_000);
