import { expect } from 'vitest';
import type { Visitor } from '../../support/browser';
import { readPdf } from '../../support/pdf-text';
import { attachmentOf, mailTo } from '../../support/product';
import { sha256Of } from './files';
import { look, type Story } from './story';

/** What stays between the competitor, the inspector and the officials. */
const secrets = (story: Story): readonly string[] => [
  story.newcomer.email,
  story.casting,
  '355.3',
  '0.4581',
  '0.4622',
  '0.8438',
  '1.72',
  '0.8432',
];

/** Lies in one string, whatever the print did with spaces and lines. */
const plain = (text: string): string => text.replace(/\s+/g, ' ');

/** The notice in the mail: its PDF says what was decided and why, and is the one that the public can check. */
export const readMailedNotice = async (
  story: Story,
  number: string,
  reasons: string,
): Promise<string> => {
  const mail = await mailTo(story.newcomer.email, new RegExp(`notice ${number}, car ${story.car}`));
  expect(mail.text).toContain(reasons);
  const pdf = await attachmentOf(mail);
  const { text } = readPdf(pdf);
  for (const said of [number, '4.3', '0.0029', '0.00009', '0.0010', '3 exhaust', 'guard band'])
    expect(plain(text)).toContain(said);
  expect(plain(text)).toContain(plain(reasons));
  for (const secret of secrets(story)) expect(text).not.toContain(secret);
  return sha256Of(pdf);
};

/** Board and notice as everybody has them: nothing runs there, and nothing else is told. */
export const readPublicPages = async (
  stranger: Visitor,
  story: Story,
  notice: { readonly number: string; readonly pdfHash: string; readonly reasons: string },
): Promise<void> => {
  const { page, open } = stranger;
  await open(`/series/${story.series}`);
  expect(await page.locator('script').count()).toBe(0);
  await page.getByRole('link', { name: notice.number }).first().click();
  await page.getByRole('heading', { name: `Notice ${notice.number}` }).waitFor();
  expect(await page.locator('script').count()).toBe(0);
  const words = plain((await page.locator('main').textContent()) ?? '');
  for (const said of ['Breach', '4.3', '0.0029', '0.00009', '0.0010', notice.reasons, 'guard band'])
    expect(words).toContain(said);
  expect(words.replaceAll(' ', '')).toContain(notice.pdfHash);
  const source = await page.content();
  for (const secret of secrets(story)) expect(source).not.toContain(secret);
};

/** The same pages for everybody, on the narrowest phone. */
export const lookAtPublicPages = async (
  stranger: Visitor,
  { series }: Story,
  number: string,
): Promise<void> => {
  await stranger.open(`/series/${series}`);
  await look(stranger, 'notice-board');
  await stranger.open(`/series/${series}/verdicts/${number}`);
  await look(stranger, 'notice');
};
