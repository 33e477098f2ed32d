import { afterAll, beforeAll, expect, test } from 'vitest';
import type { CaughtMail } from '../../scripts/local/mail.mjs';
import { handedIn, openPaddock, type Paddock } from '../support/paperwork';
import { startServer, startServices, type TestServer, type TestServices } from '../support/servers';
import { eventually } from '../support/wait';
import { openWorld, type World } from '../support/world';

const KEY = 'a key of more than twenty-four signs';

let world: World;
let paddock: Paddock;
let services: TestServices;
let server: TestServer;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  services = await startServices();
  server = await startServer({
    database: world.database,
    services,
    env: { MAIL_BOUNCE_KEY: KEY, MAIL_BOUNCES: 'bounces@tagwire.example' },
  });
});
afterAll(async () => {
  await server?.stop();
  await services?.stop();
  await world?.close();
});

const caught = (subject: RegExp): Promise<CaughtMail> =>
  eventually(`a mail about ${subject}`, async () => {
    const mails = await (await fetch(`${services.mailboxUrl}/messages.json`)).json();
    return (mails as CaughtMail[]).find((mail) => subject.test(mail.subject));
  });

const source = async (mail: CaughtMail): Promise<string> =>
  (await fetch(`${services.mailboxUrl}/messages/${mail.id}.eml`)).text();

test('a mailbox’s own button turns a kind off with one request; a foreign page’s form does not', async () => {
  await handedIn(paddock, '51');
  const text = (await source(await caught(/^Paperwork to check: car 51/))).replace(
    /\r\n[ \t]+/g,
    ' ',
  );
  const [, url = ''] = /List-Unsubscribe: <(http[^>]+)>/.exec(text) ?? [];
  expect(url).toMatch(new RegExp(`^${services.publicUrl}/mail/off/[0-9a-f]{64}$`));
  const off = () =>
    world.ports().db.execute<{ topic: string }[]>('select topic from public.mail_turned_off');

  const page = await fetch(url);
  expect(page.status).toBe(200);
  expect(await page.text()).toContain('Turn these off');
  const press = (headers: Readonly<Record<string, string>>) =>
    fetch(url, {
      method: 'POST',
      body: 'List-Unsubscribe=One-Click',
      headers: { 'content-type': 'application/x-www-form-urlencoded', ...headers },
    });
  expect((await press({ origin: 'https://elsewhere.example' })).status).toBe(403);
  expect((await press({ cookie: 'a=b' })).status).toBe(403);
  expect(await off()).toEqual([]);
  const pressed = await press({});
  expect(pressed.status).toBe(200);
  expect(await pressed.text()).toContain('is turned off');
  expect(await off()).toEqual([{ topic: 'paperwork-to-check' }]);
  expect((await fetch(`${services.publicUrl}/mail/off/${'0'.repeat(64)}`)).status).toBe(404);
});

test('a report of what came back is taken from whoever has the key, and from nobody else', async () => {
  await handedIn(paddock, '52');
  const mail = await caught(/^Receipt: .* car 52/);
  const report = `Content-Type: multipart/report; boundary=b

--b
Content-Type: message/delivery-status

Reporting-MTA: dns; relay.example

Final-Recipient: rfc822; ${mail.to[0]}
Action: failed
Status: 5.1.1
Diagnostic-Code: smtp; 550 no such mailbox

--b
Content-Type: message/rfc822

Message-ID: ${mail.messageId}

--b--
`;
  const hand = (authorization?: string) =>
    fetch(`${services.publicUrl}/api/mail/bounces`, {
      method: 'POST',
      body: report,
      headers: { 'content-type': 'message/rfc822', ...(authorization && { authorization }) },
    });
  const state = async () => {
    const [row] = await world
      .ports()
      .db.execute<{ state: string }[]>('select state from public.mail where message_id = ?', [
        mail.messageId,
      ]);
    return row?.state;
  };
  await eventually('the mail to be marked as sent', async () =>
    (await state()) === 'sent' ? true : undefined,
  );
  for (const wrong of [undefined, 'Bearer another key', `Basic ${KEY}`])
    expect((await hand(wrong)).status).toBe(401);
  expect(await state()).toBe('sent');
  const taken = await hand(`Bearer ${KEY}`);
  expect([taken.status, await taken.json()]).toEqual([200, { noted: true }]);
  expect(await state()).toBe('bounced');
});
