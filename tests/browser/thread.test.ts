import { randomUUID } from 'node:crypto';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../support/browser';
import { mailTo, readProduct } from '../support/product';
import { eventually } from '../support/wait';
import {
  addCamCard,
  addPhotographs,
  addSheet,
  answerQuestions,
  declareEngine,
  handIn,
} from './thread/competitor';
import {
  camCard,
  hasMetadata,
  hasPosition,
  lifterSheet,
  phonePicture,
  plainPicture,
  sha256Of,
  storedObject,
  type Upload,
} from './thread/files';
import {
  correctReport,
  measureBore,
  nameInspector,
  openInspection,
  signReport,
} from './thread/inspector';
import {
  acceptPaperwork,
  decideBreach,
  invite,
  openClass,
  openEvent,
  returnPaperwork,
} from './thread/official';
import { lookAtPublicPages, readMailedNotice, readPublicPages } from './thread/public';
import {
  CHIEF,
  DESK,
  follow,
  INSPECTOR,
  look,
  newStory,
  OFFICIAL,
  PHONE,
  RIVAL,
  SMALL,
  type Story,
  TABLET,
} from './thread/story';

const MINUTES = 60_000;
const REMARK = 'Lay the scale beside the rack and photograph it once more.';
const REASONS = 'The foot of one lifter is larger than its body by more than the clause allows.';
const CORRECTION = 'One foot reading was written one division low.';

const takePart = async (competitor: Visitor, { newcomer }: Story) => {
  const { page } = competitor;
  const invitation = await mailTo(newcomer.email, /invited as competitor/);
  await follow(competitor, invitation.links);
  await look(competitor, 'invitation');
  await page.getByLabel(/^Your name/).fill(newcomer.name);
  await page.getByRole('button', { name: 'Take part' }).click();
  await page.waitForURL(/\/paddock$/);
  await look(competitor, 'paddock-empty');
};

/** The original lies in the store byte for byte; what is served of it tells no place. */
const checkStored = async ({ page, context }: Visitor, picture: Upload) => {
  const original = await storedObject(`originals/${sha256Of(picture.buffer)}`);
  expect(original.equals(picture.buffer)).toBe(true);
  expect(await hasPosition(original)).toBe(true);
  const preview = page.getByRole('img', { name: new RegExp(picture.name) });
  const address = new URL((await preview.getAttribute('src')) ?? '', page.url());
  const served = await eventually('the preview', async () => {
    const answer = await context.request.get(address.href);
    return answer.ok() ? answer.body() : undefined;
  });
  expect(await hasMetadata(served)).toBe(false);
};

/** A page that is not this person's is the page that does not exist. */
const expectAbsent = async (visitor: Visitor, path: string, id: string) => {
  const { page, open, expectRefusal } = visitor;
  const unknown = path.replace(id, randomUUID());
  const told: (string | null)[] = [];
  for (const address of [path, unknown]) {
    expectRefusal({ url: new RegExp(`${address}$`), status: 404 });
    await open(address);
    told.push(await page.locator('main').textContent());
  }
  expect(told[0]).toBe(told[1]);
};

test('from the rulebook to the published verdict and its correction', {
  timeout: 20 * MINUTES,
}, async () => {
  await journey('the thread', async ({ enter }) => {
    const story = newStory();
    const { newcomer } = story;
    const official = await enter(DESK);
    await official.signInAs(OFFICIAL);
    await openClass(official, story);
    await invite(official, story);

    const competitor = await enter(PHONE);
    await takePart(competitor, story);
    const paperwork = await declareEngine(competitor, story);
    await answerQuestions(competitor, story);
    const picture = await phonePicture(story.engine);
    await addPhotographs(competitor, [
      picture,
      await plainPicture(story.engine, 'rack-close.png', '#b4bcb5'),
    ]);
    await addSheet(competitor, lifterSheet());
    await addCamCard(competitor, camCard());
    await look(competitor, 'paperwork-complete');
    const first = await handIn(competitor, 1);
    const receipt = await mailTo(newcomer.email, /^Receipt: .* version 1$/);
    expect(receipt.text).toContain(first);
    expect(receipt.text).toContain('Acceptance is not approval of the engine.');
    await checkStored(competitor, picture);

    await returnPaperwork(official, story, REMARK);
    const returned = await mailTo(newcomer.email, /^Returned: /);
    expect(returned.text).toContain(REMARK);
    await follow(competitor, returned.links);
    await competitor.page.getByText(REMARK).waitFor();
    await look(competitor, 'paperwork-returned');
    await addPhotographs(competitor, [
      await plainPicture(story.engine, 'rack-with-scale.png', '#d8dcd2'),
    ]);
    const second = await handIn(competitor, 2);
    expect(second).not.toBe(first);
    await competitor.page.getByRole('link', { name: 'Version 1' }).click();
    await competitor.page.getByText(first).waitFor();
    await look(competitor, 'version-1');
    await acceptPaperwork(official, story);
    const accepted = await mailTo(newcomer.email, /^Accepted: /);
    expect(accepted.text).toContain('Acceptance is not approval of the engine.');
    await competitor.open(paperwork);
    await competitor.page.getByText(/^Accepted .* Acceptance is not approval/).waitFor();
    await look(competitor, 'accepted');

    await openEvent(official, story);
    const chief = await enter(DESK);
    await chief.signInAs(CHIEF);
    const inspectionId = await nameInspector(chief, story);
    const inspector = await enter(TABLET);
    await inspector.signInAs(INSPECTOR);
    await openInspection(inspector, story);
    await measureBore(inspector, story, await phonePicture(story.engine));
    await signReport(inspector, inspectionId);

    const rival = await enter(PHONE);
    await rival.signInAs(RIVAL);
    const paperworkId = paperwork.split('/').at(-1) ?? '';
    await expectAbsent(rival, paperwork, paperworkId);
    await expectAbsent(inspector, `/office/verdicts/${inspectionId}`, inspectionId);

    const number = await decideBreach(official, inspectionId, REASONS);
    expect(number).toMatch(/^\d{4}-\d{3}$/);
    const pdfHash = await readMailedNotice(story, number, REASONS);
    const notice = { number, pdfHash, reasons: REASONS };
    const stranger = await enter({ ...SMALL, javaScript: false });
    await readPublicPages(stranger, story, notice);
    await lookAtPublicPages(await enter(SMALL), story, number);
    await competitor.open('/paddock');
    await competitor.page.getByRole('link', { name: `notice ${number}` }).waitFor();
    await look(competitor, 'paddock-decided');

    await correctReport(inspector, inspectionId, CORRECTION);
    await official.open(`/barn/inspections/${inspectionId}`);
    for (const revision of [1, 2])
      await official.page.getByText(new RegExp(`^Revision ${revision}, signed`)).waitFor();
    await stranger.open(`/series/${story.series}/verdicts/${number}`);
    expect(await stranger.page.locator('main').textContent()).toContain('0.0029');
  });
});

test('somebody signs in by a link that works once', { timeout: 3 * MINUTES }, async () => {
  await journey('sign-in by link', async ({ enter }) => {
    const visitor = await enter(PHONE);
    const { page, open } = visitor;
    const { email } = readProduct().people.find(({ name }) => name === RIVAL) ?? { email: '' };
    await open('/sign-in');
    await look(visitor, 'sign-in');
    await page.getByLabel('E-mail address').fill(email);
    await page.getByRole('button', { name: 'Send me a link' }).click();
    await page.getByRole('heading', { name: 'Look into your mail' }).waitFor();
    const mail = await mailTo(email, /^Your link to sign in$/);
    // Opened once by a mail program, which presses no button.
    const peek = await visitor.context.request.get(mail.links[0] ?? '');
    expect(peek.status()).toBe(200);
    await follow(visitor, mail.links);
    await look(visitor, 'link');
    await page.getByRole('button', { name: 'Sign in now' }).click();
    await page.waitForURL(/\/paddock$/);
    expect(await page.locator('body').textContent()).toContain(RIVAL);

    const second = await enter(PHONE);
    await follow(second, mail.links);
    second.expectRefusal({ url: /\/sign-in\/link\//, status: 410 });
    await second.page.getByRole('button', { name: 'Sign in now' }).click();
    await second.page.getByRole('link', { name: 'Ask for a new link' }).waitFor();
    await look(second, 'link-used');
    await second.open('/paddock');
    await second.page.waitForURL(/\/sign-in/);
  });
});
