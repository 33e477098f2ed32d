import pg from 'pg';
import type { Locator } from 'playwright-core';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../../support/browser';
import { mailTo, readProduct } from '../../support/product';
import { readCode } from '../../support/read-code';

const ask = async (sql: string): Promise<string> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  const { rows } = await client.query(sql).finally(() => client.end());
  const value: unknown = Object.values(rows[0] ?? {})[0];
  if (value === undefined) throw new Error(`Nothing for: ${sql}`);
  return String(value);
};

const inspectionOf = (car: string) =>
  ask(
    `select i.id from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     where e.car_number = '${car}' order by i.picked_at limit 1`,
  );

const noticeOn = (car: string) =>
  ask(
    `select v.number from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     where e.car_number = '${car}' order by v.published_at limit 1`,
  );

const look = async (visitor: Visitor, name: string) => {
  await visitor.page.waitForLoadState('networkidle');
  await visitor.expectNoSidewaysScroll();
  await visitor.expectAccessible();
  await visitor.shot(`custody-${name}`);
};

const textOf = async (part: Locator): Promise<string> =>
  ((await part.textContent()) ?? '').replace(/\s+/g, ' ');

const words = ({ page }: Visitor) => textOf(page.locator('main'));

test('a gauge is withdrawn: the look-back lists what relied on it, and changes nothing', async () => {
  const [breach, sound] = [await noticeOn('12J'), await noticeOn('408')];
  const before = await ask(
    "select string_agg(encode(hash, 'hex'), ',' order by id) from record.verdict",
  );
  await journey('a gauge found bad', async ({ enter }) => {
    const chief = await enter({ viewport: { width: 1180, height: 820 } });
    await chief.signInAs('Marit Quell');
    await chief.open('/crib');
    await chief.page.getByRole('link', { name: 'IM-02', exact: true }).click();
    await chief.page.getByRole('heading', { name: 'What it measured' }).waitFor();
    expect(await words(chief)).toContain('C-7760');
    await look(chief, 'gauge-history');
    await chief.page.getByRole('link', { name: 'Found bad' }).click();
    chief.expectRefusal({ url: /\/bad$/, status: 422 });
    await chief.page.getByRole('button', { name: /^Withdraw gauge IM-02/ }).click();
    await chief.page.getByRole('alert').waitFor();
    await chief.page.getByLabel('What was found, and how').fill('Its rod is bent; it reads large.');
    await chief.page.getByLabel('By how much it is off').fill('0.004 in');
    await look(chief, 'gauge-found-bad');
    await chief.page.getByRole('button', { name: /^Withdraw gauge IM-02/ }).click();
    await chief.page.getByRole('heading', { name: 'Verdicts under review' }).waitFor();
    const listed = await words(chief);
    for (const notice of [breach, sound]) expect(listed).toContain(notice);
    expect(listed).toContain('since its calibration');
    await look(chief, 'look-back');

    const official = await enter({ viewport: { width: 1280, height: 900 } });
    const mail = await mailTo('ilse.tornkvist@example.org', /IM-02 was found bad/);
    expect(mail.subject).toContain('2 under review');
    await official.signInAs('Ilse Törnkvist');
    await official.open('/office/verdicts');
    await look(official, 'reviews');
    await official.page
      .getByRole('listitem')
      .filter({ hasText: sound })
      .getByRole('link', { name: 'Say whether it stands' })
      .click();
    const stranger = await enter({ viewport: { width: 390, height: 844 } });
    const shown = async () => {
      await stranger.open(`/series/corran-valley/verdicts/${sound}`);
      // A public page may be kept by the browser for a moment.
      await stranger.page.reload();
      return words(stranger);
    };
    expect(await shown()).not.toMatch(/review/);
    const review = official.page.getByRole('article', { name: `Notice ${sound}` });
    await review.getByRole('button', { name: /under review/ }).click();
    await review.getByText(/, public$/).waitFor();
    expect(await shown()).toContain('This verdict is under review');
    await review
      .getByLabel(/^Why it stands/)
      .fill('The stroke was read with a second gauge as well.');
    await review.getByRole('button', { name: 'The verdict stands' }).click();
    await review.getByText(/^“The stroke was read/).waitFor();
    const said = await shown();
    expect(said).toContain('It stands');
    expect(said).not.toContain('second gauge');
    await look(stranger, 'reviewed-notice');

    // It comes back from the maker.
    await chief.open('/crib');
    await chief.page.getByRole('link', { name: 'IM-02', exact: true }).click();
    await chief.page.getByRole('link', { name: 'Figures and certificate' }).click();
    await chief.page.locator('#certificate-file:enabled').waitFor();
    await chief.page.getByLabel('The certificate itself').setInputFiles({
      name: 'C-7801.pdf',
      mimeType: 'application/pdf',
      buffer: Buffer.from('%PDF-1.7\n% a certificate\n%%EOF'),
    });
    await chief.page.getByText('C-7801.pdf is kept').waitFor();
    await chief.page.getByLabel('Certificate number').fill('C-7801');
    await chief.page.getByLabel('In use').check();
    await chief.page.getByRole('button', { name: 'Save the gauge' }).click();
    await chief.page.getByRole('link', { name: 'IM-02', exact: true }).click();
    await chief.page.getByRole('link', { name: 'the file' }).waitFor();
    expect(await words(chief)).toMatch(/C-7760[\s\S]*C-7801/);
  });
  const after = await ask(
    "select string_agg(encode(hash, 'hex'), ',' order by id) from record.verdict",
  );
  expect(after).toBe(before);
});

test('a held part: its tag, a hand-over, an opening, the return, and a gap that is shown', async () => {
  const inspection = await inspectionOf('88');
  await journey('a held part', async ({ enter }) => {
    const inspector = await enter({ viewport: { width: 820, height: 1180 }, touch: true });
    const { page } = inspector;
    await inspector.signInAs('Oona Brannick');
    await inspector.open(`/barn/inspections/${inspection}`);
    await page.getByRole('link', { name: 'Seals and held parts' }).click();
    await page.getByText('Record a seal').click();
    await page.getByLabel('Number on the seal').fill('30551');
    await page.getByLabel('Where it sits').fill('oil pan');
    await page.getByRole('button', { name: 'Record the seal' }).click();
    await page.getByText('Seal 30551 was found at oil pan, where none is on record.').waitFor();
    inspector.expectRefusal({ url: /\/custody$/, status: 422 });
    await page.getByText('Take a part into custody').click();
    await page.getByRole('button', { name: 'Give it a tag' }).click();
    await page.getByRole('alert').waitFor();
    await page.getByLabel('The part', { exact: true }).fill('Lifter');
    await page.getByLabel('Its place on the engine').fill('intake 5');
    await page.getByLabel('The clause that relies on it').selectOption('4.2');
    await page.getByLabel('Number of its bag').fill('B-900');
    await page.getByRole('button', { name: 'Give it a tag' }).click();
    await page.getByRole('heading', { name: /^Tag T-/ }).waitFor();
    const tag = (await textOf(page.getByRole('heading', { level: 1 }))).trim().replace('Tag ', '');
    await look(inspector, 'part-new');
    const pdf = await page.getByRole('link', { name: 'Print the tag' }).getAttribute('href');
    const printed = await inspector.context.request.get(new URL(pdf ?? '', page.url()).href);
    expect([printed.status(), (await printed.body()).subarray(0, 5).toString()]).toEqual([
      200,
      '%PDF-',
    ]);

    const code = await readCode(page.getByRole('img', { name: `Code of tag ${tag}` }));
    expect(code).toContain(`#TAG=${tag};CAR=88;PART=Lifter,_intake_5;CLAUSE=4.2;BAG=B-900;`);
    expect(code).toMatch(/;SHA256=[0-9a-f]{64}$/);

    const record = async (kind: string, fields: Readonly<Record<string, string>>) => {
      await page.getByLabel(kind, { exact: true }).check();
      for (const [label, text] of Object.entries(fields))
        await page.getByLabel(label, { exact: true }).fill(text);
      const acts = page.getByRole('list', { name: /^What happened/ }).getByRole('listitem');
      const before = await acts.count();
      await page.getByRole('button', { name: 'Record it' }).click();
      await acts.nth(before).waitFor();
    };
    const GIVER = 'Who gives it, opens it or closes it';
    await record('Handed over', {
      'Who receives it': 'Marit Quell',
      Why: 'Night',
      'Where it is kept now': 'Impound, shelf 2',
    });
    expect(await words(inspector)).toContain('Marit Quell has it, Impound, shelf 2.');
    await record('Opened', {
      'Who saw it opened': 'Wren Halloway',
      Why: 'Measured again',
      'Number of the bag': 'B-900',
    });
    await record('Closed again', { 'Number of the bag': 'B-901' });
    expect(await words(inspector)).not.toContain('Gap in the chain');
    await record('Handed over', {
      [GIVER]: 'Somebody Else',
      'Who receives it': 'Dov Aranet',
      Why: 'Not said',
    });
    expect(await words(inspector)).toContain(
      'Somebody Else acted on it; the last on record as holding it is Marit Quell.',
    );
    await look(inspector, 'part-with-gap');
    await inspector.open('/barn/impound');
    const row = page.getByRole('row', { name: new RegExp(tag) });
    expect(await textOf(row)).toMatch(/Dov Aranet[\s\S]*1 gap/);
    await look(inspector, 'impound');
    await row.getByRole('link', { name: tag }).click();
    await record('Given back', { 'Who receives it': 'Wren Halloway' });
    expect(await words(inspector)).toContain('It was given back.');

    const scanning = await enter({ viewport: { width: 390, height: 844 } });
    await scanning.signInAs('Ilse Törnkvist');
    await scanning.page.goto(code);
    expect(await words(scanning)).toContain('It was given back.');
    const competitor = await enter({ viewport: { width: 390, height: 844 } });
    await competitor.signInAs('Wren Halloway');
    competitor.expectRefusal({ url: /\/barn\/parts\//, status: 404 });
    await competitor.page.goto(code);
    expect(await words(competitor)).not.toContain(tag);
  });
});
