import pg from 'pg';
import { readSheet as readXlsxRows } from 'read-excel-file/node';
import { expect, test } from 'vitest';
import type { Clause } from '@/domain/rulebook/clause';
import { inches, limit } from '@/domain/rulebook/rule-sets/rule-set';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { journey } from '../../support/browser';
import { readProduct } from '../../support/product';
import { DESK, look, OFFICIAL, PHONE } from '../thread/story';
import { beginPaperwork } from './sheet-steps';
import { openClass } from './weekly-class';

const MINUTES = 60_000;
const TITLE = 'Cam table, lift by degree';
const [bushed] = TAPPET_RULE_SET.clauses.filter(({ number }) => number === '4.4');
if (bushed === undefined) throw new Error('The rule set has no such clause.');

const lash = { lash: inches('0.000'), checkingLifter: 'solid' } as const;

const CLAUSES: readonly Clause[] = [
  { number: '4', heading: 'Cam and tappets', words: 'What holds for both.', force: 'text' },
  bushed,
  {
    number: '4.7',
    heading: 'Lobe lift',
    words:
      'Lobe lift at the pushrod, with a solid checking lifter and no lash, is at most 0.3300 in.',
    force: 'mandatory',
    penaltyRow: 'A',
    requirement: limit({
      quantity: 'lobe-lift',
      unit: 'in',
      per: 'bore',
      datum: 'at the pushrod',
      max: inches('0.3300'),
      ...lash,
    }),
  },
  {
    number: '4.8',
    heading: 'Duration',
    words: 'Duration between 0.050 in lift rising and falling is at most 149 degrees.',
    force: 'mandatory',
    penaltyRow: 'A',
    requirement: limit({
      quantity: 'duration',
      unit: 'deg',
      per: 'bore',
      datum: 'between 0.050 in lift rising and falling',
      max: { text: '149', unit: 'deg' },
      ...lash,
    }),
  },
  {
    number: '4.9',
    heading: 'Cam table',
    words: 'The cam table gives the lift of each lobe by degree.',
    force: 'mandatory',
    penaltyRow: 'B',
    requirement: { kind: 'sheet', subject: 'cam-table', sheet: 'lift-table', title: TITLE },
  },
];

/** By hand: at 0.050 in the intake runs from 30 to 170, the exhaust from 410 to 560; one lift has lost its point. */
const card = (intake: string): string =>
  [
    'Cam 44;;',
    `Degrees;${intake};Exhaust lift`,
    ...'0 0.0000|20 0.0200|40 0.0800|60 0.2000|80 0.3100|100 0.3200|120 3.000|140 0.1900|160 0.0700|180 0.0300'
      .split('|')
      .map((row) => `${row.replace(' ', ';')};`),
    ...'390 0.0000|410 0.0500|450 0.2500|480 0.3300|520 0.2400|560 0.0500|580 0.0000'
      .split('|')
      .map((row) => row.replace(' ', ';;')),
  ].join('\r\n');

test('a cam table by degree is imported, seen as a curve and held against lift and duration; one bore differs; a waiver is shown', {
  timeout: 5 * MINUTES,
}, async () => {
  await journey('cam table', async ({ enter }) => {
    const stamp = Date.now().toString(36);
    const className = `Cam Eight ${stamp}`;
    // A heading that nobody explained before.
    const hub = `Hub ${stamp}`;
    const official = await enter(DESK);
    await official.signInAs(OFFICIAL);
    const classId = await openClass(official, className, CLAUSES);
    await official.open(`/office/rulebooks/${classId}/waive`);
    await official.page.getByLabel('Clause', { exact: true }).selectOption('4.4');
    await official.page.getByLabel('Car number').fill('31');
    await official.page.getByLabel('What is allowed instead').fill('One bushed bore may run.');
    await official.page.getByLabel('Reason').fill('Repaired before the rule.');
    await official.page.getByLabel(/^Until/).fill(`${new Date().getFullYear() + 1}-06-30T18:00`);
    await official.page.getByRole('button', { name: 'Grant and publish this waiver' }).click();
    await official.page.getByRole('rowheader', { name: 'Waiver 1' }).waitFor();

    const competitor = await enter(PHONE);
    const { page } = competitor;
    await competitor.signInAs('Tobin Larkspur');
    const about = { className, car: '30', engine: `CT ${stamp}` };
    const paperworkId = await beginPaperwork(competitor, about);
    const check = page.getByRole('region', { name: 'Check against the rules' });
    const clause = (number: string) =>
      check.getByRole('listitem').filter({ hasText: `${number} ` });

    await page
      .getByRole('group', { name: /bushed/ })
      .getByLabel('No')
      .check();
    await page.getByText('Not the same at every bore?').click();
    await page.getByLabel('Another bore').selectOption('3 intake');
    await page.getByLabel('Is the lifter bore bushed? 3 intake').selectOption('yes');
    await page.getByText('Not the same at 1 of 16').waitFor();
    await clause('4.4')
      .getByText(/3 intake/)
      .first()
      .waitFor();
    await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
    await page.reload();
    await page.locator('[data-ready="yes"]').waitFor();
    await page.getByText('no; 3 intake: yes').waitFor();
    await page.getByRole('button', { name: /^change ?Is the lifter bore bushed/ }).click();
    await page.getByRole('button', { name: /^As the rest ?: 3 intake$/ }).click();
    await page.getByText('Not the same at every bore?').waitFor();

    const section = page.getByRole('region', { name: TITLE, exact: true });
    await section.getByText('2 missing').waitFor();
    const [template] = await Promise.all([
      page.waitForEvent('download'),
      section.getByRole('link', { name: 'XLSX in millimetres' }).click(),
    ]);
    const rows = await readXlsxRows(await template.path());
    expect(rows.find(([first]) => first === 'Crankshaft degrees')).toEqual([
      'Crankshaft degrees',
      'intake Lobe lift (mm)',
      'exhaust Lobe lift (mm)',
    ]);
    expect(rows.at(-1)?.[0]).toBe('720');

    await page
      .locator(`input[type="file"][aria-label="Add a sheet: ${TITLE}"]`)
      .setInputFiles([{ name: 'cam.csv', mimeType: 'text/csv', buffer: Buffer.from(card(hub)) }]);
    const open = page.getByRole('region', { name: 'cam.csv, not confirmed yet' });
    await open.getByText('1 to say').waitFor();
    await open.getByLabel(`${hub} holds`).selectOption({ label: 'Lobe lift, intake' });
    await open.getByText('all known').waitFor();
    await open.getByText(/^120 deg, intake lobe lift: 3\.000 in lies off the curve/).waitFor();
    expect(await open.textContent()).toContain('In row 9, column B of cam.csv (cell B9).');
    await look(competitor, 'cam-table-preview');
    await open.getByRole('button', { name: 'Correct 120 deg, intake lobe lift' }).click();
    await open.getByLabel('120 deg, intake lobe lift, in in').fill('0.3000');
    await open.getByRole('button', { name: 'Take this' }).click();
    await open
      .getByRole('img', { name: /Intake: 10 lifts, the largest 0\.3200 in at 100 deg\./ })
      .waitFor();
    await open.getByRole('button', { name: 'Confirm these 17 values' }).click();
    await open.waitFor({ state: 'detached' });

    await section.getByText('2 of 2 lobes complete').waitFor();
    await section
      .getByText(
        'Exhaust: 7 lifts, the largest 0.3300 in at 480 deg; 150.0 deg between 0.050 in rising and falling.',
      )
      .waitFor();
    // Equal to the limit on lift; a degree over that on duration, at the eight exhaust bores.
    expect(await clause('4.7').first().textContent()).toContain('within');
    expect(await clause('4.8').getByRole('listitem').count()).toBe(8);
    await look(competitor, 'cam-table');
    await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
    await page.getByRole('link', { name: 'Check and hand in' }).click();
    await page.getByRole('button', { name: 'Hand in version 1' }).click();
    await page.getByText(/^Version 1, ledger line/).waitFor();
    await official.open(`/office/paperwork/${paperworkId}`);
    await official.page.getByRole('img', { name: /150\.0 deg between 0\.050 in/ }).waitFor();
    await official.page.getByText('All values, and where each came from').last().click();
    const line = official.page
      .getByRole('table', { name: `${TITLE}: all values` })
      .getByRole('row', { name: /^120 / });
    expect(await line.textContent()).toContain('0.3000 in');
    expect(await line.textContent()).toContain('held “3.000”, corrected by hand');
    await look(official, 'cam-table-office');

    // The same engine in the car that the waiver names.
    await beginPaperwork(competitor, { ...about, car: '31', engine: `CW ${stamp}` });
    const waivers = page.getByRole('region', { name: 'Waivers' });
    expect(await waivers.textContent()).toContain('Waiver 1, clause 4.4, for car 31');
    expect(await waivers.textContent()).toContain('One bushed bore may run.');
    await clause('4.4')
      .filter({ hasText: /waived/i })
      .first()
      .waitFor();
    await look(competitor, 'waiver-in-the-form');
  });
});

test('what the last teardown found stands beside what is declared now, difference by difference', {
  timeout: 4 * MINUTES,
}, async () => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ owner: string; engine: string; notice: string }>(
      `select o.name as owner, p.engine_id as engine, v.number as notice
       from record.verdict v
       join public.inspection i on i.series_id = v.series_id and i.id = v.inspection_id
       join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
       join public.engine e on e.id = p.engine_id and e.owner_id = p.competitor_id
       join public.person o on o.id = p.competitor_id
       join record.report r on r.series_id = v.series_id and r.inspection_id = v.inspection_id
         and r.revision = v.report_revision
       where r.document like '%lifter-body-diameter%'
         -- Of the demo's own: other journeys publish verdicts on other bores.
         and v.number in ('2026-001', '2026-002')
       order by v.published_at desc limit 1`,
    );
    const [known] = rows;
    if (known === undefined) throw new Error('The demo has no verdict on an engine.');
    await journey('last teardown', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const className = `Rebuilt Eight ${stamp}`;
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const clauses = TAPPET_RULE_SET.clauses.filter(({ number }) =>
        ['4', '4.2', '4.6', '5', '5.2'].includes(number),
      );
      await openClass(official, className, clauses);
      const competitor = await enter(DESK);
      const { page } = competitor;
      await competitor.signInAs(known.owner);
      await competitor.open(`/paddock/paperwork/new?engine=${known.engine}`);
      const kind = page.getByLabel('Class', { exact: true });
      const wanted = kind.locator('option', { hasText: className });
      await kind.selectOption((await wanted.getAttribute('value')) ?? '');
      await page.getByLabel('Car number').fill('58');
      await page.getByRole('button', { name: 'Begin the paperwork' }).click();
      await page.locator('[data-ready="yes"]').waitFor();
      const beside = page.getByRole('region', { name: 'Against the last teardown' });
      expect(await beside.textContent()).toContain(`Notice ${known.notice}`);
      const section = page.getByRole('region', { name: 'Lifter sheet, one row per bore' });
      await section.getByText('Type or see all values').click();
      const cell = section.getByLabel('1 intake, Lifter body diameter');
      const was = await cell.inputValue();
      await cell.fill('0.8436');
      const row = beside.getByRole('row', { name: /1 intake.*0\.8436/ });
      await row.getByText('differs').waitFor();
      const found = /([\d.]+) in\s*differs/.exec((await row.textContent()) ?? '')?.[1] ?? '';
      expect(Number(found)).toBeGreaterThan(0.83);
      await cell.fill(found);
      await row.waitFor({ state: 'detached' });
      await look(competitor, 'last-teardown');
      await cell.fill(was);
      await page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();
    });
  } finally {
    await client.end();
  }
});
