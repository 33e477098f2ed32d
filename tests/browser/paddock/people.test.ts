import sharp from 'sharp';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../../support/browser';
import { mailTo, readProduct } from '../../support/product';
import { DESK, follow, look, OFFICIAL, PHONE } from '../thread/story';
import { openClass, WEEKLY } from './weekly-class';

const MINUTES = 60_000;
const SHORT = WEEKLY.filter(({ number }) => ['1', '1.1', '1.4', '2', '2.1'].includes(number));

const picture = async (shade: string) => ({
  name: `${shade.slice(1)}.jpg`,
  mimeType: 'image/jpeg',
  buffer: await sharp({ create: { width: 640, height: 480, channels: 3, background: shade } })
    .jpeg()
    .toBuffer(),
});

const ready = ({ page }: Visitor) => page.locator('[data-ready="yes"]').waitFor();
const saved = ({ page }: Visitor) => page.locator('.saved-line', { hasText: /^Sent/ }).waitFor();

const emailOf = (who: string): string =>
  readProduct().people.find(({ name }) => name === who)?.email ?? '';

const begin = async (
  visitor: Visitor,
  className: string,
  car: string,
  engine: string,
): Promise<string> => {
  const { page, open } = visitor;
  await open('/paddock/paperwork/new');
  const wanted = page
    .getByLabel('Class', { exact: true })
    .locator('option', { hasText: className });
  await page
    .getByLabel('Class', { exact: true })
    .selectOption((await wanted.getAttribute('value')) ?? '');
  await page.getByLabel('Car number').fill(car);
  await page.locator('input[name="engine"][value="new"]').check();
  await page.getByLabel('Your name for it').fill(engine);
  await page.getByLabel('Block casting number').fill('41-7730');
  await page.getByRole('button', { name: 'Begin the paperwork' }).click();
  await page.waitForURL(/\/paddock\/paperwork\/[0-9a-f-]{36}$/);
  await ready(visitor);
  return new URL(page.url()).pathname;
};

const addPicture = async ({ page }: Visitor, shade: string): Promise<void> => {
  const [chooser] = await Promise.all([
    page.waitForEvent('filechooser'),
    page
      .locator('button')
      .and(page.getByRole('button', { name: /^(Photograph|Add another) ?: Block casting/ }))
      .click(),
  ]);
  await chooser.setFiles(await picture(shade));
  await page.getByText('1 of 1').waitFor();
};

test(
  'a builder is invited, writes for a customer, and loses sight of it when the customer ends it',
  async () => {
    await journey('builder', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const className = `Builder Eight ${stamp}`;
      await openClass(official, className, SHORT);
      const competitor = await enter(PHONE);
      await competitor.signInAs('Nell Farrowby');
      const engine = `NF-${stamp}`.toUpperCase();
      const path = await begin(competitor, className, '55', engine);

      const { page } = competitor;
      await competitor.open('/paddock/builders');
      await page.getByLabel('Their e-mail address').fill(`quill.${stamp}@example.org`);
      await page.getByLabel(engine, { exact: true }).check();
      await page.getByLabel('Answer the questions and add photographs').check();
      await look(competitor, 'builders');
      await page.getByRole('button', { name: 'Send the invitation' }).click();
      await page.getByText('invited, not taken up yet').first().waitFor();

      const mail = await mailTo(`quill.${stamp}@example.org`, /invites you to work/);
      const builder = await enter(DESK);
      await follow(builder, mail.links);
      await look(builder, 'builder-invitation');
      await builder.page.getByLabel('Your name').fill('Quill Ferrant');
      await builder.page.getByRole('button', { name: 'Take it up' }).click();
      await builder.page.waitForURL(/\/paddock$/);
      await builder.page.getByRole('heading', { name: 'Nell Farrowby' }).waitFor();
      await look(builder, 'builder-paddock');
      await builder.open(path);
      await ready(builder);
      await builder.page.getByLabel('Solid flat').check();
      await addPicture(builder, '#556b2f');
      await saved(builder);
      await builder.page.getByRole('link', { name: 'Check and hand in' }).click();
      await builder.page.getByText('Nell Farrowby lets you write here, not hand in').waitFor();
      await builder.page.getByRole('link', { name: 'Engine' }).count();

      await competitor.open('/paddock/builders');
      await page
        .getByRole('row', { name: new RegExp(engine) })
        .getByRole('button')
        .click();
      await page.waitForLoadState('networkidle');
      builder.expectRefusal({ url: new RegExp(path), status: 404 });
      await builder.open(path);
      await builder.page
        .getByRole('heading', { name: /not|nothing/i })
        .first()
        .waitFor();
    });
  },
  5 * MINUTES,
);

test(
  'an engine is sold: the receiver takes it over with its seals and history, not with its sheets',
  async () => {
    await journey('engine sold', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const className = `Sale Eight ${stamp}`;
      await openClass(official, className, SHORT);
      const seller = await enter(PHONE);
      await seller.signInAs('Odo Marchbank');
      const engine = `OM-${stamp}`.toUpperCase();
      const path = await begin(seller, className, '3', engine);
      await seller.open(path);
      await seller.page.getByRole('link', { name: `Engine ${engine}: seals and history` }).click();
      await seller.page.getByRole('link', { name: 'Sell or lend it' }).waitFor();
      await look(seller, 'engine');
      await seller.page.getByRole('link', { name: 'Sell or lend it' }).click();
      await seller.page.getByLabel('Their e-mail address').fill(emailOf('Greta Silverlock'));
      await look(seller, 'hand-over');
      await seller.page.getByRole('button', { name: 'Offer it' }).click();
      await seller.page.getByText('not accepted yet').waitFor();

      const buyer = await enter(PHONE);
      await follow(buyer, (await mailTo(emailOf('Greta Silverlock'), new RegExp(engine))).links);
      await look(buyer, 'engine-offer');
      await buyer.page.getByLabel('Your name for the engine').fill(`GS-${stamp}`.toUpperCase());
      await buyer.page.getByRole('button', { name: 'Take it over' }).click();
      await buyer.page.getByText('sold by Odo Marchbank to Greta Silverlock').waitFor();
      await look(buyer, 'engine-bought');
      await buyer.page.getByRole('link', { name: 'Declare it for a class' }).waitFor();
      buyer.expectRefusal({ url: new RegExp(path), status: 404 });
      await buyer.open(path);
      // The seller keeps what he wrote, and can hand it in no more.
      await seller.open(path);
      await ready(seller);
    });
  },
  5 * MINUTES,
);

test(
  'a guardian signs for a minor by the link that goes to them',
  async () => {
    await journey('guardian', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const className = `Junior Eight ${stamp}`;
      await openClass(official, className, SHORT);
      await official.open('/office/people/corran-valley');
      await official.page.getByText('Mark a competitor as under age').click();
      await official.page
        .getByLabel('Competitor', { exact: true })
        .selectOption({ label: 'Junia Ashgrove' });
      await official.page.getByLabel('Guardian’s name').fill('Maud Ashgrove');
      await official.page.getByLabel('Guardian’s e-mail address').fill(`maud.${stamp}@example.org`);
      await official.page.getByRole('button', { name: 'The guardian signs from now on' }).click();
      await official.page.getByText('Junia Ashgrove: Maud Ashgrove signs').waitFor();
      await look(official, 'people-minor');

      const minor = await enter(PHONE);
      await minor.signInAs('Junia Ashgrove');
      await begin(minor, className, '19K', `JA-${stamp}`.toUpperCase());
      await minor.page.getByLabel('Solid flat').check();
      await addPicture(minor, '#8b4513');
      await saved(minor);
      await minor.page.getByRole('link', { name: 'Check and hand in' }).click();
      await minor.page.getByRole('button', { name: 'Ask Maud Ashgrove to sign' }).waitFor();
      await look(minor, 'minor-check');
      expect(await minor.page.getByRole('button', { name: /^Hand in/ }).count()).toBe(0);
      await minor.page.getByRole('button', { name: 'Ask Maud Ashgrove to sign' }).click();
      await minor.page.getByText('Sent to Maud Ashgrove.').waitFor();

      const guardian = await enter(PHONE);
      await follow(
        guardian,
        (await mailTo(`maud.${stamp}@example.org`, /needs your signature/)).links,
      );
      await look(guardian, 'guardian');
      await guardian.page
        .getByRole('button', { name: 'Sign for Junia Ashgrove and hand in' })
        .click();
      await guardian.page.getByText('Signed and handed in as version 1.').waitFor();
      await look(guardian, 'guardian-signed');

      await official.open('/office/paperwork');
      await official.page
        .getByRole('row', { name: new RegExp(`JA-${stamp}`, 'i') })
        .getByRole('link')
        .click();
      await official.page
        .getByText('by Maud Ashgrove, for Junia Ashgrove, who is under age')
        .waitFor();
      await look(official, 'paperwork-signed-for');
      await official.open('/office/people/corran-valley');
      await official.page.getByRole('button', { name: /^End this.*Junia Ashgrove/ }).click();
      await official.page.waitForLoadState('networkidle');
    });
  },
  5 * MINUTES,
);

test(
  'returned paperwork asks for a change or an answer to each remark; two devices are joined field by field',
  async () => {
    await journey('returned', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const className = `Return Eight ${stamp}`;
      await openClass(official, className, SHORT);
      const phone = await enter(PHONE);
      await phone.signInAs('Bastian Quorne');
      const engine = `BQ-${stamp}`.toUpperCase();
      const path = await begin(phone, className, '204', engine);
      await phone.page.getByLabel('Solid flat').check();
      await addPicture(phone, '#223344');
      await saved(phone);
      await phone.page.getByRole('link', { name: 'Check and hand in' }).click();
      await phone.page.getByRole('button', { name: 'Hand in version 1' }).click();
      await phone.page.getByText(/^Version 1, ledger line/).waitFor();

      const check = async () => {
        await official.open('/office/paperwork');
        await official.page
          .getByRole('row', { name: new RegExp(engine) })
          .getByRole('link')
          .click();
        await official.page.getByRole('heading', { name: new RegExp(engine) }).waitFor();
      };
      await check();
      await official.page.getByText('Remark on Block casting number').click();
      await official.page
        .getByLabel('What is to be put right: Block casting number')
        .fill('Is it 7730 or 7780?');
      await official.page.getByRole('button', { name: 'Return it with remarks' }).click();
      await official.page.waitForURL(/\/office\/paperwork$/);

      await phone.open(path);
      await ready(phone);
      await phone.page.getByText('1 remark to answer').waitFor();
      expect(await phone.page.getByRole('link', { name: 'Check and hand in' }).count()).toBe(0);
      await look(phone, 'returned');
      await phone.page.getByLabel('Your answer to the remark').fill('7730, read twice.');
      await saved(phone);
      await phone.page.getByRole('link', { name: 'Check and hand in' }).waitFor();

      // A second device goes on from here while the first has no connection.
      const desk = await enter(DESK);
      await desk.signInAs('Bastian Quorne');
      await desk.open(path);
      await ready(desk);
      await phone.context.setOffline(true);
      phone.expectRefusal({ url: /\/draft$/, status: 412 });
      phone.expectRefusal({ url: /\/draft$/, status: 'offline' });
      await phone.page.getByLabel('Anything they should know').fill('From the phone.');
      await desk.page.getByLabel('Anything they should know').fill('From the desk.');
      await desk.page
        .getByRole('button', { name: /^change/ })
        .first()
        .click();
      await saved(desk);
      await phone.context.setOffline(false);
      await phone.page.getByText('Changed on another device').first().waitFor();
      await look(phone, 'two-devices');
      await phone.page.getByLabel(/^On the other device: From the desk/).check();
      await phone.page.getByRole('button', { name: 'Go on with these' }).click();
      await saved(phone);
      expect(await phone.page.getByLabel('Anything they should know').inputValue()).toBe(
        'From the desk.',
      );

      await phone.page.getByRole('link', { name: 'Check and hand in' }).click();
      await phone.page.getByText('Changed since version 1').waitFor();
      await look(phone, 'hand-in-again');
      await phone.page.getByRole('button', { name: 'Hand in version 2' }).click();
      await phone.page.getByText(/^Version 2, ledger line/).waitFor();
      await check();
      const words = await official.page.locator('main').textContent();
      expect(words).toContain('Answer to the remark before: 7730, read twice.');
      expect(words).toContain('Changed since version 1');
      await look(official, 'side-by-side');
      await official.page.getByRole('button', { name: 'Accept the paperwork' }).click();
      await official.page.waitForURL(/\/office\/paperwork$/);

      await phone.open('/paddock');
      await look(phone, 'paddock-weekend');
      await phone.open(`${path}/withdraw`);
      await phone.page.getByLabel('Why, for the officials').fill('Another engine runs.');
      await look(phone, 'withdraw');
      await phone.page.getByRole('button', { name: 'Withdraw the paperwork' }).click();
      await phone.page.getByText(/^Withdrawn .*declares nothing any more/).waitFor();
    });
  },
  5 * MINUTES,
);

test(
  'an owner puts the casting of an engine right; the draft follows, what stood there before stays to be read',
  async () => {
    await journey('engine put right', async ({ enter }) => {
      const stamp = Date.now().toString(36);
      const official = await enter(DESK);
      await official.signInAs(OFFICIAL);
      const className = `Casting Eight ${stamp}`;
      await openClass(official, className, SHORT);
      const owner = await enter(PHONE);
      await owner.signInAs('Nell Farrowby');
      const engine = `NC-${stamp}`.toUpperCase();
      const path = await begin(owner, className, '56', engine);
      expect(await owner.page.locator('main').textContent()).toContain('41-7730');
      await owner.page.getByRole('link', { name: `Engine ${engine}: seals and history` }).click();
      await owner.page.getByText('Put castings or serial right').click();
      await owner.page.getByLabel('Block casting number').fill('41-7780');
      await look(owner, 'engine-put-right');
      await owner.page.getByRole('button', { name: 'Put it right' }).click();
      await owner.page.getByText(/by Nell Farrowby: block casting 41-7730, now 41-7780/).waitFor();
      await owner.open(path);
      await ready(owner);
      expect(await owner.page.locator('main').textContent()).toContain('41-7780');
      expect(await owner.page.locator('main').textContent()).not.toContain('41-7730');
    });
  },
  5 * MINUTES,
);
