import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { openMailer } from '@/adapters/mail/smtp';
import { MailRefused, type OutgoingMail } from '@/services/ports';
import { type CaughtMail, startMailCatcher } from '../../../scripts/local/mail.mjs';

let folder: string;
let catcher: Awaited<ReturnType<typeof startMailCatcher>>;
let mailer: ReturnType<typeof openMailer>;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tagwire-smtp-'));
  catcher = await startMailCatcher({ smtpPort: 0, pagePort: 0, folder });
  mailer = openMailer(catcher.smtpUrl, 'bounces@tagwire.example');
});
afterAll(async () => {
  mailer.close();
  await catcher.stop();
  rmSync(folder, { recursive: true, force: true });
});

const mail = (to: string): OutgoingMail => ({
  to,
  from: 'Tech office <tech@tagwire.example>',
  subject: 'Notice 1',
  text: 'What happened.\n',
  html: '<p>What happened.</p>',
  messageId: '<one@tagwire.example>',
  headers: {
    'List-Unsubscribe': '<http://127.0.0.1/mail/off/abc>',
    'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
  },
  attachments: [],
});

it('sends text and HTML under its own Message-ID, with the fields for mailboxes, and says the answer', async () => {
  expect(await mailer.send(mail('wren@example.org'))).toMatch(/^250 /);
  const [caught] = (await (await fetch(`${catcher.url}/messages.json`)).json()) as CaughtMail[];
  expect(caught).toMatchObject({ to: ['wren@example.org'], messageId: '<one@tagwire.example>' });
  const source = await (await fetch(`${catcher.url}/messages/${caught?.id}.eml`)).text();
  for (const field of [
    'List-Unsubscribe: <http://127.0.0.1/mail/off/abc>',
    'List-Unsubscribe-Post: List-Unsubscribe=One-Click',
    'Auto-Submitted: auto-generated',
    'Content-Type: text/plain',
    'Content-Type: text/html',
  ])
    expect(source).toContain(field);
});

it('tells a refusal for good from one for now, in the server’s words', async () => {
  const forGood = await mailer.send(mail('no-such-mailbox@example.org')).catch((error) => error);
  expect(forGood).toBeInstanceOf(MailRefused);
  expect(forGood.message).toBe('550 5.1.1 There is no such mailbox here');
  const forNow = await mailer.send(mail('full-mailbox@example.org')).catch((error) => error);
  expect(forNow).not.toBeInstanceOf(MailRefused);
  expect(forNow.message).toContain('452 4.2.2 The mailbox is full');
});

it('a server that is not there is no refusal', async () => {
  const nowhere = openMailer('smtp://127.0.0.1:9');
  const error = await nowhere.send(mail('wren@example.org')).catch((trouble) => trouble);
  expect(error).toBeInstanceOf(Error);
  expect(error).not.toBeInstanceOf(MailRefused);
  nowhere.close();
});
