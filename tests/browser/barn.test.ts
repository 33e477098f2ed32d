import { randomUUID } from 'node:crypto';
import type { Locator } from 'playwright-core';
import { expect, test } from 'vitest';
import { uuidV7 } from '@/components/measuring/queue/uuid-v7';
import { journey, type Visitor } from '../support/browser';
import { readProduct } from '../support/product';

const OFFICIAL = 'Ilse Törnkvist';
const CHIEF = 'Marit Quell';
const INSPECTOR = 'Oona Brannick';
const SECOND = 'Dov Aranet';
const { publicUrl } = readProduct();
const LANDSCAPE = { viewport: { width: 1180, height: 820 }, touch: true };
const PORTRAIT = { viewport: { width: 820, height: 1180 }, touch: true };

/** Picks a car of the coming event that nobody has picked yet. */
const pickCar = async (official: Visitor): Promise<string> => {
  const { page, open } = official;
  await open('/office/events');
  await page
    .getByRole('link', { name: /Tallow Mere Evening/ })
    .first()
    .click();
  await page.getByRole('link', { name: 'Pick cars' }).click();
  const why = page.getByLabel(/^Why car \w+ is picked$/).last();
  const car = /car (\w+)/.exec((await why.getAttribute('aria-label')) ?? '')?.[1] ?? '';
  await why.selectOption({ label: 'Nominated' });
  await page
    .getByLabel(`Reason for car ${car}`, { exact: true })
    .fill('Drawn by hand before the drivers');
  expect(await why.locator('option', { hasText: 'Drawn' }).count()).toBe(0);
  await page.getByRole('button', { name: 'Pick these cars' }).click();
  await page.getByText('The cars are picked').waitFor();
  return car;
};

const live = async ({ page }: Visitor): Promise<void> => {
  await page.locator('[data-live="live"]').first().waitFor();
};
const rowOf = ({ page }: Visitor, car: string): Locator =>
  page
    .getByRole('row')
    .filter({ has: page.getByRole('rowheader', { name: `Car ${car}`, exact: true }) })
    .filter({ hasText: 'Tallow Mere Evening' });

/** Whatever the tablet would send, by the same person. */
const sendCheck = async ({ page }: Visitor, inspection: string, subject: string, value: string) => {
  const answer = await page.request.post(`${publicUrl}/api/inspections/${inspection}/captures`, {
    headers: { origin: publicUrl },
    data: {
      act: uuidV7(),
      clockOffsetMs: 0,
      rows: [
        {
          kind: 'remark',
          remark: 'check',
          id: randomUUID(),
          occurredAt: new Date().toISOString(),
          place: { bank: '', cylinder: '', valve: '' },
          subject,
          value,
          reason: '',
        },
      ],
    },
  });
  expect(answer.status(), await answer.text()).toBe(200);
};

test('two tablets on one list and one inspection, a conflict refused, an engine re-opened on Monday', async () => {
  await journey('barn', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const car = await pickCar(official);

    const chief = await enter(LANDSCAPE);
    const tablet = await enter(PORTRAIT);
    await chief.signInAs(CHIEF);
    await tablet.signInAs(INSPECTOR);
    await tablet.open('/barn');
    await live(tablet);
    expect(await rowOf(tablet, car).textContent()).toContain('Name an inspector');
    await tablet.expectNoSidewaysScroll();
    await tablet.expectAccessible();
    await tablet.shot('barn-820-list');

    await chief.open('/barn');
    await rowOf(chief, car).getByRole('link').last().click();
    await chief.page.getByRole('heading', { name: 'Before the first bolt' }).waitFor();
    expect(await chief.page.locator('main').textContent()).toContain(
      'Drawn by hand before the drivers',
    );
    await chief.page.getByText(`Asked for by ${OFFICIAL}`).waitFor();
    const path = new URL(chief.page.url()).pathname;
    const id = path.split('/').at(-1) ?? '';
    await live(chief);

    // An interest that is declared while the chief's page is open.
    const second = await enter(PORTRAIT);
    await second.signInAs(SECOND);
    await second.open('/barn/interests');
    await second.page
      .getByLabel('What ties them')
      .selectOption({ label: 'Builds or built their engines' });
    await second.page.getByLabel('Or to which car, by its number').fill(car.toLowerCase());
    await second.page.getByLabel('In words').fill('Rebuilt it in spring');
    await second.expectAccessible();
    await second.shot('barn-820-interests');
    await second.page.getByRole('button', { name: 'Declare it' }).click();
    await second.page.getByText('The interest is declared.').waitFor();

    const chooses = chief.page.getByLabel('Inspector', { exact: true });
    const dov = await chooses.locator('option', { hasText: SECOND }).getAttribute('value');
    await chooses.selectOption(dov);
    await chief.page.getByLabel('Bay').fill('4');
    chief.expectRefusal({ url: /\/barn\/inspections\//, status: 422 });
    await chief.page.getByRole('button', { name: 'Save', exact: true }).click();
    await chief.page
      .getByText(
        `${SECOND} builds this competitor’s engines (Rebuilt it in spring) and cannot inspect this car.`,
      )
      .first()
      .waitFor();
    await chief.expectAccessible();
    await chief.shot('barn-1180-conflict');
    expect(await chief.page.getByLabel('Bay').inputValue()).toBe('4');
    await chief.page.getByRole('button', { name: `Name ${INSPECTOR} instead` }).click();
    await chief.page.getByText(`Saved: ${INSPECTOR}, bay 4.`).waitFor();
    await chief.shot('barn-1180-named');

    // The other tablet's list says so by itself.
    await rowOf(tablet, car).getByText(INSPECTOR).waitFor();
    await rowOf(tablet, car)
      .getByRole('link', { name: /^Go to it/ })
      .click();
    await tablet.page.getByRole('button', { name: 'Open the inspection' }).click();
    await tablet.page.waitForURL(/\/measure$/);
    await tablet.page.getByRole('region', { name: 'Keypad' }).waitFor();
    await chief.page.getByText('Open', { exact: false }).first().waitFor();
    await chief.page.locator('[data-part="history"]').getByText('Opened').waitFor();
    await sendCheck(tablet, id, 'tappet-type', 'flat');
    await chief.page.locator('[data-part="findings"]').getByText('Solid flat: complies').waitFor();

    // What the chief is writing is not pulled away by the other tablet.
    await chief.page.getByLabel('Bay').fill('5');
    await sendCheck(tablet, id, 'tappet-type', 'roller');
    await tablet.open(path);
    await tablet.page.getByText('Hold, stop, put off, refused').click();
    await tablet.page.getByLabel('Why, in words').fill('Curfew at 23:00');
    await tablet.page.getByLabel('Bag or crate number').fill('B-12');
    await tablet.page.getByLabel('Seals put on').fill('4471, 4472');
    await tablet.page.getByLabel('Where it is kept, or goes on').fill('Locked store, Quarrel Fen');
    await tablet.expectAccessible();
    await tablet.shot('barn-820-stop');
    await tablet.page.getByRole('button', { name: 'Stop the teardown' }).click();
    await tablet.page
      .getByRole('heading', { name: 'Take it up again, here or elsewhere' })
      .waitFor();
    await chief.page.locator('[data-part="history"]').getByText('bag or crate: B-12').waitFor();
    expect(await chief.page.getByLabel('Bay').inputValue()).toBe('5');
    await chief.page.getByText('Another tablet changed something here').waitFor();
    await chief.shot('barn-1180-held');

    // Monday, elsewhere: the same inspection.
    await tablet.page
      .getByLabel('Where it is opened now')
      .fill('Workshop of the series, Alder Row');
    await tablet.page.getByLabel('Seals as found, with their state').fill('4471, 4472 unbroken');
    await tablet.page.getByLabel('Bag or crate it came out of').fill('B-12');
    await tablet.page.getByLabel('In words', { exact: true }).fill('Opened before the owner');
    await tablet.page.getByRole('button', { name: 'Take it up again' }).click();
    await tablet.page.waitForURL(/\/measure$/);
    await tablet.page.getByRole('region', { name: 'Keypad' }).waitFor();
    await tablet.open(path);
    const history = tablet.page.locator('[data-part="history"]');
    expect(await history.getByRole('listitem').allTextContents()).toEqual([
      expect.stringContaining(`${INSPECTOR} named as inspector`),
      expect.stringContaining('Opened'),
      expect.stringMatching(
        /Teardown stopped: Curfew at 23:00[\s\S]*place: Locked store, Quarrel Fen; bag or crate: B-12; seals: 4471, 4472/,
      ),
      expect.stringMatching(
        /Taken up again: Opened before the owner[\s\S]*place: Workshop of the series, Alder Row[\s\S]*4471, 4472 unbroken/,
      ),
    ]);
    await tablet.page.getByText('Taken apart elsewhere').waitFor();
    await tablet.expectNoSidewaysScroll();
    await tablet.expectAccessible();
    await tablet.shot('barn-820-monday');

    // Handed over by who has it; the list of a third tablet without a stream asks by itself.
    await second.page.route(/\/api\/barn\/[^/]+\/live/, (route) =>
      route.fulfill({ status: 503, body: '' }),
    );
    second.expectRefusal({ url: /\/api\/barn\/.*\/live/, status: 503 });
    await second.open('/barn');
    await second.page.getByText('Not live: asking every 10 s').waitFor();
    await tablet.page.getByText('Hand it over to another inspector').click();
    await tablet.page.getByLabel('Who takes it over').selectOption({ label: CHIEF });
    await tablet.page.getByLabel('Why', { exact: true }).fill('On another track on Tuesday');
    await tablet.page.getByRole('button', { name: 'Hand it over', exact: true }).click();
    await tablet.page.getByText(`Handed over to ${CHIEF}.`).waitFor();
    await rowOf(second, car).getByText(CHIEF).waitFor();
  });
});
