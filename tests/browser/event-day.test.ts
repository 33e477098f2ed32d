import { expect, test } from 'vitest';
import { uuidV7 } from '@/components/measuring/queue/uuid-v7';
import { journey, type Visitor } from '../support/browser';
import { readProduct } from '../support/product';
import { runningSeason } from '../support/season';

const OFFICIAL = 'Ilse Törnkvist';
const CHIEF = 'Marit Quell';
const INSPECTOR = 'Oona Brannick';
const { publicUrl } = readProduct();
const TABLET = { viewport: { width: 820, height: 1180 }, touch: true };

const inHours = (hours: number): string =>
  new Intl.DateTimeFormat('sv-SE', {
    timeZone: 'America/Chicago',
    dateStyle: 'short',
    timeStyle: 'short',
  })
    .format(new Date(Date.now() + hours * 3_600_000))
    .replace(' ', 'T');

const openClass = async ({ page, open }: Visitor, name: string): Promise<void> => {
  await open('/office');
  await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
  const season = runningSeason(page);
  await season.getByLabel(/^New class in season/).fill(name);
  await season.getByRole('button', { name: 'Add the class' }).click();
  await page.getByRole('link', { name, exact: true }).click();
  await page.getByRole('link', { name: 'Start the first edition' }).click();
  await page.getByLabel('Rule set: Weights').check();
  await page.getByRole('button', { name: 'Start writing' }).click();
  await page.waitForURL(/\/draft\//);
  await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
  await page.waitForLoadState('networkidle');
  await page.getByRole('link', { name: 'Check before publishing' }).click();
  await page.getByRole('button', { name: `Publish this edition for ${name}` }).click();
  await page.getByRole('rowheader', { name: 'Edition 1' }).waitFor();
};

const openEvent = async ({ page, open }: Visitor, name: string): Promise<string> => {
  await open('/office/events/new');
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByLabel('Track').fill('Quarrel Fen Oval');
  await page.getByLabel('Starts').fill(inHours(1));
  await page.getByLabel('Ends').fill(inHours(5));
  await page.getByRole('button', { name: 'Open the event' }).click();
  await page.getByRole('heading', { name }).waitFor();
  return new URL(page.url()).pathname;
};

const addScale = async ({ page, open }: Visitor, code: string): Promise<void> => {
  await open('/crib');
  const series = /\/crib\/([0-9a-f-]{36})\//.exec(
    (await page.locator('a[href^="/crib/"]').first().getAttribute('href')) ?? '',
  )?.[1];
  const answer = await page.request.post(`${publicUrl}/api/gauges/${series}`, {
    headers: { origin: publicUrl },
    data: {
      act: uuidV7(),
      id: uuidV7(),
      code,
      description: {
        kind: 'scale',
        name: 'Platform scale',
        division: { text: '1', unit: 'lb' },
        calibratedOn: '2026-01-02',
        dueOn: '2036-01-02',
      },
      status: 'in-use',
      version: 0,
    },
  });
  expect(answer.status(), await answer.text()).toBe(200);
};

test('a file is mapped and entered, all cars are checked, one page is signed, results become official', async () => {
  await journey('event day', async ({ enter }) => {
    const stamp = Date.now().toString(36);
    const [className, eventName] = [`Scale Class ${stamp}`, `Scale Night ${stamp}`];
    // A name that no file of the series had before.
    const car = `Startnr ${stamp}`;
    const official = await enter();
    const { page } = official;
    await official.signInAs(OFFICIAL);
    await openClass(official, className);
    const event = await openEvent(official, eventName);

    // A timing program's file: other names, decimal commas, a mark of bytes, a title line.
    const file = (lines: readonly string[]) => ({
      name: 'feature.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from(
        `\uFEFFFeature;;;;;\r\n${[`${car};Fahrer;Wertung;Rang;Lap 1;Lap 2`, ...lines].join('\r\n')}`,
      ),
    });
    await official.open(`${event}/import`);
    await official.expectAccessible();
    await page
      .getByLabel('A CSV file')
      .setInputFiles(
        file([
          `007;Ann Veld;${className};1;17,482;17,399`,
          `12j;Bo Rask;${className};2;17,500;1:02,300`,
          `8;Cy Thorn;${className};2;18,1;18,0`,
          `9;Di Wren;Nowhere;DNF;;`,
        ]),
      );
    await page.getByRole('button', { name: 'Look through it first' }).click();
    await page.getByText('Choose which column is “Car number”.').waitFor();
    await official.expectAccessible();
    await official.expectNoSidewaysScroll();
    await official.shot('event-1280-mapping');
    await page.getByLabel('Car number (needed)').selectOption({ label: car });
    await page.getByLabel('Competitor (needed)').selectOption({ label: 'Fahrer' });
    await page.getByLabel('Class', { exact: true }).selectOption({ label: 'Wertung' });
    await page.getByLabel('Position').selectOption({ label: 'Rang' });
    await page.getByRole('button', { name: 'Look again with these columns' }).click();
    await page.getByText('Cars 12J and 8 cannot both be 2.').waitFor();
    await page.getByText('“Nowhere” is no class of this season').waitFor();
    expect(await page.getByRole('button', { name: /^Enter/ }).count()).toBe(0);
    await official.shot('event-1280-conflicts');
    await page.getByRole('link', { name: 'Another file' }).click();
    const good = [
      `007;Ann Veld;${className};1;17,482;17,399`,
      `12j;Bo Rask;${className};2;17,500;1:02,300`,
      `8;Cy Thorn;${className};3;18,1;18,0`,
      `9;Di Wren;${className};DNF;;`,
    ];
    await page.getByLabel('A CSV file').setInputFiles(file(good));
    await page.getByRole('button', { name: 'Look through it first' }).click();
    await page.getByLabel('Car number (needed)').selectOption({ label: car });
    await page.getByLabel('Competitor (needed)').selectOption({ label: 'Fahrer' });
    await page.getByLabel('Class', { exact: true }).selectOption({ label: 'Wertung' });
    await page.getByLabel('Position').selectOption({ label: 'Rang' });
    await page.getByRole('button', { name: 'Look again with these columns' }).click();
    await page.getByRole('button', { name: 'Enter 4 cars' }).click();
    await page.getByText('The file is entered.').waitFor();
    expect(await page.getByRole('row', { name: /007/ }).textContent()).toContain('17,399');
    // The next file of the series needs no choosing.
    await official.open(`${event}/import`);
    await page.getByLabel('A CSV file').setInputFiles(file(good));
    await page.getByRole('button', { name: 'Look through it first' }).click();
    expect(await page.getByLabel('Car number (needed)').inputValue()).toBe(car.toLowerCase());
    expect(await page.getByText('entered already: as it is').count()).toBe(4);

    // On the day: one car is scratched, with the reason.
    await official.open(event);
    await page.getByRole('link', { name: 'Change car 9' }).click();
    official.expectRefusal({ url: /\/entries\//, status: 422 });
    await page.getByRole('button', { name: 'Keep the change' }).click();
    await page.getByText('Write why it changes.').first().waitFor();
    await official.expectAccessible();
    await page.getByLabel('Why', { exact: true }).fill('Engine blown in the heat');
    await page.getByRole('button', { name: 'Keep the change' }).click();
    await page.getByText('The change is kept').waitFor();
    await official.shot('event-1280-entries');

    const chief = await enter();
    await chief.signInAs(CHIEF);
    await addScale(chief, `SC-${stamp}`);
    await addScale(chief, `SD-${stamp}`);

    // Every car over the scale, on a tablet; another tablet sees it at once.
    const tablet = await enter(TABLET);
    await tablet.signInAs(INSPECTOR);
    const checks = event.replace('/office/', '/barn/');
    await tablet.open(checks);
    await chief.open(checks);
    await chief.page.getByText('Not checked yet').first().waitFor();
    await tablet.page.getByLabel('Read on').selectOption({ label: `SC-${stamp}, Platform scale` });
    const weigh = async (car: string, pounds: string, says: string) => {
      const input = tablet.page.getByLabel(`Car ${car}, lb`);
      await input.fill(pounds);
      await input.press('Enter');
      await tablet.page.getByRole('listitem').filter({ has: input }).getByText(says).waitFor();
    };
    await weigh('007', '2800', 'Passed');
    await chief.page.getByText('2800 lb, SC-').waitFor();
    await weigh('12J', '2791', 'Not passed');
    await tablet.page.getByRole('link', { name: 'Car 12J: inspection' }).waitFor();
    await tablet.expectAccessible();
    await tablet.expectNoSidewaysScroll();
    await tablet.shot('event-820-checks');
    await tablet.page.getByRole('link', { name: 'One page, one signature' }).click();
    await tablet.page.getByText('1 check is open above').waitFor();
    tablet.expectRefusal({ url: /\/sheet$/, status: 422 });
    await tablet.page.getByRole('button', { name: /^Sign for/ }).click();
    await tablet.page.getByText('Car 8: clause 2 is not checked').waitFor();
    await tablet.page.getByRole('link', { name: 'Back to the checks' }).click();
    // Written down under the wrong scale: corrected with why, and not weighed or typed again.
    await tablet.page.getByLabel('Read on').selectOption({ label: `SD-${stamp}, Platform scale` });
    await weigh('8', '2834', 'Passed');
    const row = tablet.page
      .getByRole('listitem')
      .filter({ has: tablet.page.getByLabel('Car 8, lb') });
    await row.getByText(`2834 lb, SD-${stamp}`).waitFor();
    await row.getByText('Another gauge').click();
    await row
      .getByLabel('Which gauge it was, car 8')
      .selectOption({ label: `SC-${stamp}, Platform scale` });
    await row.getByLabel('Why the gauge is corrected, car 8').fill('It stood on the other scale');
    await tablet.expectAccessible();
    await tablet.expectNoSidewaysScroll();
    await tablet.shot('event-820-correct-gauge');
    await row.getByRole('button', { name: 'Correct the gauge' }).click();
    await row.getByText(`2834 lb, SC-${stamp}`).waitFor();
    await row.getByText('Gauge corrected: It stood on the other scale').waitFor();
    await tablet.page.getByRole('link', { name: 'One page, one signature' }).click();
    await tablet.page.getByRole('button', { name: 'Sign for 3 cars', exact: true }).click();
    await tablet.page.getByText(`Signed by ${INSPECTOR}`).waitFor();
    await tablet.expectAccessible();
    await tablet.expectNoSidewaysScroll();
    await tablet.shot('event-820-signed');

    // Results wait for the car that is held, or say in public why they do not.
    await official.open(`${event}/results`);
    await page.getByText('unofficial, 1 held for inspection').waitFor();
    await official.expectAccessible();
    official.expectRefusal({ url: /\/results$/, status: 422 });
    await page.getByRole('button', { name: `Make ${className} official` }).click();
    await page.getByText('Car 12J is held for inspection').first().waitFor();
    await official.shot('event-1280-results');
    const slug = await page
      .getByRole('link', { name: 'As everybody sees it' })
      .getAttribute('href');
    const visitor = await enter({ viewport: { width: 390, height: 844 } });
    await visitor.open(slug ?? '');
    await visitor.page.getByText('held for inspection: car 12J').waitFor();
    await visitor.page.getByText('2 of 3 cars passed what was checked').waitFor();
    expect(await visitor.page.locator('main').textContent()).not.toMatch(/2834|Brannick|Ann Veld/);
    await visitor.expectAccessible();
    await visitor.expectNoSidewaysScroll();
    await visitor.shot('event-390-public');
    await page
      .getByLabel('Why the results do not wait for car 12J')
      .fill('Weighed again on Monday.');
    await page.getByRole('button', { name: `Make ${className} official` }).click();
    await page.getByText('The results are official.').waitFor();
    await official.shot('event-1280-official');
    await page.getByRole('link', { name: 'As everybody sees it' }).click();
    await page.getByText('Not waited for: Weighed again on Monday.').waitFor();
  });
});
