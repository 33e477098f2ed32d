import { expect, test } from 'vitest';
import { journey } from '../support/browser';
import { mailTo } from '../support/product';
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
import {
  CHIEF,
  DESK,
  follow,
  INSPECTOR,
  look,
  newStory,
  OFFICIAL,
  PHONE,
  TABLET,
} from './thread/story';

const MINUTES = 60_000;

test('from the rulebook to the published verdict and its correction', {
  timeout: 15 * MINUTES,
}, async () => {
  await journey('the thread', async ({ enter }) => {
    const story = newStory();
    const { newcomer } = story;
    const official = await enter(DESK);
    await official.signInAs(OFFICIAL);
    await openClass(official, story);
    await invite(official, story);

    const competitor = await enter(PHONE);
    const invitation = await mailTo(newcomer.email, /invited as competitor/);
    await follow(competitor, invitation.links);
    await look(competitor, 'invitation');
    await competitor.page.getByLabel(/^Your name/).fill(newcomer.name);
    await competitor.page.getByRole('button', { name: 'Take part' }).click();
    await competitor.page.waitForURL(/\/paddock$/);
    await look(competitor, 'paddock-empty');

    const paperwork = await declareEngine(competitor, story);
    await answerQuestions(competitor, story);
    const picture = await phonePicture(story.engine);
    expect(await hasPosition(picture.buffer)).toBe(true);
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
    const original = await storedObject(`originals/${sha256Of(picture.buffer)}`);
    expect(original.equals(picture.buffer)).toBe(true);
    const address = await competitor.page
      .getByRole('img', { name: new RegExp(picture.name) })
      .getAttribute('src');
    const served = await competitor.context.request.get(
      new URL(address ?? '', competitor.page.url()).href,
    );
    expect(served.status()).toBe(200);
    expect(await hasMetadata(await served.body())).toBe(false);

    const remark = 'Lay the scale beside the rack and photograph it once more.';
    await returnPaperwork(official, story, remark);
    const returned = await mailTo(newcomer.email, /^Returned: /);
    expect(returned.text).toContain(remark);
    await follow(competitor, returned.links);
    await competitor.page.getByText(remark).waitFor();
    await look(competitor, 'paperwork-returned');
    await addPhotographs(competitor, [
      await plainPicture(story.engine, 'rack-with-scale.png', '#d8dcd2'),
    ]);
    const second = await handIn(competitor, 2);
    expect(second).not.toBe(first);
    await competitor.page.getByRole('link', { name: 'Version 1' }).click();
    expect(await competitor.page.locator('main').textContent()).toContain(first);
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

    const reasons =
      'The foot of one lifter is larger than its body by more than the clause allows.';
    const number = await decideBreach(official, inspectionId, reasons);
    expect(number).toMatch(/^\d{4}-\d{3}$/);
    await correctReport(inspector, inspectionId, 'One foot reading was written one division low.');
  });
});
