import { expect } from 'vitest';
import type { Visitor } from '../../support/browser';
import { runningSeason } from '../../support/season';
import { here, look, type Story } from './story';

/** Adds a class to the season and publishes its rulebook, started from the tappet rule set. */
export const openClass = async (official: Visitor, story: Story): Promise<void> => {
  const { page } = official;
  await look(official, 'office');
  await page.getByRole('link', { name: 'Seasons and classes' }).first().click();
  const season = runningSeason(page);
  await season.getByLabel(/^New class in season/).fill(story.className);
  await look(official, 'classes');
  await season.getByRole('button', { name: 'Add the class' }).click();
  await page.getByRole('link', { name: story.className, exact: true }).click();
  await page.getByRole('link', { name: 'Start the first edition' }).click();
  await page.getByLabel('Rule set: Tappets').check();
  await look(official, 'rulebook-start');
  await page.getByRole('button', { name: 'Start writing' }).click();
  await page.waitForURL(/\/draft\//);
  await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
  await look(official, 'rulebook-draft');
  await page.getByRole('link', { name: 'Check before publishing' }).click();
  const publish = page.getByRole('button', { name: `Publish this edition for ${story.className}` });
  await publish.waitFor();
  await look(official, 'rulebook-check');
  await publish.click();
  await page.getByRole('rowheader', { name: 'Edition 1' }).waitFor();
  await look(official, 'rulebook-published');
};

export const invite = async (official: Visitor, story: Story): Promise<void> => {
  const { page, open } = official;
  await open('/office');
  await page.getByRole('link', { name: 'People' }).first().click();
  await page.getByLabel('E-mail address', { exact: true }).fill(story.newcomer.email);
  await page.getByLabel('As', { exact: true }).selectOption({ label: 'competitor' });
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await page.getByText(`${story.newcomer.email}, competitor`).waitFor();
  await look(official, 'people');
};

const openPaperwork = async ({ page, open }: Visitor, story: Story): Promise<void> => {
  await open('/office');
  await page.getByRole('link', { name: 'Paperwork to check' }).click();
  await page
    .getByRole('row', { name: new RegExp(story.engine) })
    .getByRole('link')
    .click();
  await page.getByRole('heading', { name: new RegExp(story.engine) }).waitFor();
};

/** Returns the paperwork with a remark beside the photographs. */
export const returnPaperwork = async (
  official: Visitor,
  story: Story,
  remark: string,
): Promise<void> => {
  const { page } = official;
  await openPaperwork(official, story);
  expect(await page.locator('main').textContent()).toContain('lifters HB.csv');
  await page.getByText('Remark on Photograph of the lifters').click();
  await page.getByLabel('What is to be put right: Photograph of the lifters').fill(remark);
  await look(official, 'paperwork-return');
  await page.getByRole('button', { name: 'Return it with remarks' }).click();
  await page.waitForURL(/\/office\/paperwork$/);
};

export const acceptPaperwork = async (official: Visitor, story: Story): Promise<void> => {
  const { page } = official;
  await openPaperwork(official, story);
  const words = await page.locator('main').textContent();
  expect(words).toContain('new in this version');
  expect(words).toContain('Acceptance is not approval of the engine.');
  await look(official, 'paperwork-accept');
  await page.getByRole('button', { name: 'Accept the paperwork' }).click();
  await page.waitForURL(/\/office\/paperwork$/);
  await look(official, 'paperwork-list');
};

/** In an hour by the track's clocks, as the field wants it. */
const inHours = (hours: number): string =>
  new Intl.DateTimeFormat('sv-SE', {
    timeZone: 'America/Chicago',
    dateStyle: 'short',
    timeStyle: 'short',
  })
    .format(new Date(Date.now() + hours * 3_600_000))
    .replace(' ', 'T');

/** Opens the event, enters the car by hand and picks it. */
export const openEvent = async (official: Visitor, story: Story): Promise<void> => {
  const { page, open } = official;
  await open('/office');
  await page.getByRole('link', { name: 'Events, entries and picks' }).first().click();
  await page.getByRole('link', { name: 'Open an event' }).click();
  await page.getByLabel('Name', { exact: true }).fill(story.event);
  await page.getByLabel('Track').fill('Quarrel Fen Oval');
  await page.getByLabel('Starts').fill(inHours(1));
  await page.getByLabel('Ends').fill(inHours(5));
  await look(official, 'event-new');
  await page.getByRole('button', { name: 'Open the event' }).click();
  await page.getByRole('heading', { name: story.event }).waitFor();
  await page.getByLabel('Car number').fill(story.car);
  await page.getByLabel('Class', { exact: true }).selectOption({ label: story.className });
  await page.getByLabel('Competitor', { exact: true }).fill(story.newcomer.name);
  await page.getByLabel('Their e-mail address').fill(story.newcomer.email);
  await page.getByLabel('Engine', { exact: true }).fill(story.engine);
  await page.getByRole('button', { name: 'Add the car' }).click();
  await page.getByRole('rowheader', { name: story.car }).waitFor();
  await look(official, 'event');
  await page.getByRole('link', { name: 'Pick cars' }).click();
  await page.getByLabel(`Why car ${story.car} is picked`).selectOption({ label: 'Nominated' });
  await page.getByLabel(`Reason for car ${story.car}`).fill('New engine');
  await look(official, 'picks');
  await page.getByRole('button', { name: 'Pick these cars' }).click();
  await page.getByRole('link', { name: 'To do' }).first().waitFor();
};

/** Breach of the foot clause: written down, read as everybody will, published. Gives the notice's number. */
export const decideBreach = async (
  official: Visitor,
  inspectionId: string,
  reasons: string,
): Promise<string> => {
  const { page, open } = official;
  await open('/office');
  await page.getByRole('link', { name: 'Verdicts', exact: true }).first().click();
  const undecided = page.locator(`a[href="/office/verdicts/${inspectionId}"]`);
  await undecided.waitFor();
  await look(official, 'verdicts');
  await undecided.click();
  await page.waitForURL(new RegExp(inspectionId));
  expect(await page.locator('main').textContent()).toContain('finding: fail');
  await look(official, 'decide');
  await page.getByRole('radio', { name: /^Breach/ }).check();
  await page.getByRole('checkbox', { name: /^4\.3 Foot/ }).check();
  await page.getByLabel(/^Penalty/).selectOption('A|1');
  await page.getByLabel('Reasons').fill(reasons);
  await page.getByRole('button', { name: /^Write down and see the notice/ }).click();
  await page.getByRole('heading', { name: 'Read the notice before you publish it' }).waitFor();
  expect(await page.locator('main').textContent()).toContain(reasons);
  await look(official, 'notice-preview');
  await page.getByRole('button', { name: /^Publish: car/ }).click();
  await page.waitForURL(/\/office\/verdicts\?published=/);
  await page.getByRole('status').waitFor();
  await look(official, 'published');
  return new URL(page.url()).searchParams.get('published') ?? here(official);
};
