import { createHash, randomBytes, randomUUID } from 'node:crypto';
import pg from 'pg';
import { expect, test } from 'vitest';
import { journey, type Visitor } from '../support/browser';
import { readProduct } from '../support/product';

const PHONE = { width: 390, height: 844 };
const DESK = { width: 1280, height: 900 };

const look = async (visitor: Visitor, name: string): Promise<void> => {
  for (const size of [PHONE, DESK]) {
    await visitor.page.setViewportSize(size);
    await visitor.shot(`mail-${name}-${size.width}`);
    await visitor.expectNoSidewaysScroll();
    await visitor.expectAccessible();
  }
};

const withDatabase = async <T>(run: (client: pg.Client) => Promise<T>): Promise<T> => {
  const client = new pg.Client({ connectionString: readProduct().superuserUrl });
  await client.connect();
  return run(client).finally(() => client.end());
};

/** A notice that the receiving server refused, as sending leaves it. */
const refusedNotice = (subject: string) =>
  withDatabase((client) =>
    client.query(
      `insert into public.mail (id, series_id, person_id, address, kind, subject, message_id, content,
         state, attempts, last_error, answer, created_at, changed_at)
       select $1, s.id, p.id, p.email, 'verdict-published', $2, $3,
         '{"paragraphs": ["Secret words of the notice."], "link": {"label": "x", "path": "/"}, "attachments": []}',
         'refused', 1, '550 5.1.1 no such mailbox', '550 5.1.1 no such mailbox', now(), now()
       from public.series s, public.person p where s.slug = 'corran-valley' and p.name = 'Wren Halloway'`,
      [randomUUID(), subject, `<${randomUUID()}@tagwire.example>`],
    ),
  );

test('an official sees what went to whom, and serves a notice otherwise that did not reach', async () => {
  const subject = `Notice ${Date.now().toString(36)}`;
  await refusedNotice(subject);
  await journey('messages of a series', async ({ enter }) => {
    const official = await enter({ viewport: DESK });
    const { page, open } = official;
    await official.signInAs('Ilse Törnkvist');
    await open('/office/mail/corran-valley');
    await look(official, 'list');
    expect(await page.locator('main').textContent()).not.toContain('Secret words of the notice.');
    await page.getByRole('link', { name: 'Only what did not reach' }).click();
    const row = page.getByRole('row', { name: new RegExp(subject) });
    await row.getByText('Did not reach. Serve it otherwise, and record how.').waitFor();
    await row.getByText('550 5.1.1 no such mailbox').waitFor();
    await row.getByRole('link', { name: /^Served otherwise/ }).click();
    await page.getByLabel('How the person was told').fill(' ');
    official.expectRefusal({ url: /office\/mail/, status: 422 });
    await page.getByRole('button', { name: 'Record the service' }).click();
    await page.getByRole('link', { name: 'Write how the person was told instead.' }).waitFor();
    await look(official, 'serve');
    await page
      .getByLabel('How the person was told')
      .fill('Handed over in bay 2, before a witness.');
    await page.getByRole('button', { name: 'Record the service' }).click();
    await page
      .getByRole('row', { name: new RegExp(subject) })
      .getByText('Handed over in bay 2, before a witness.', { exact: false })
      .waitFor();
    await look(official, 'served');
  });
});

test('a person chooses which optional messages come, signed in or by the link in one', async () => {
  const token = randomBytes(32).toString('hex');
  await withDatabase((client) =>
    client.query(
      `insert into public.mail_off_link (token_hash, person_id, topic, created_at)
       select $1, id, 'due-soon', now() from public.person where name = 'Wren Halloway'`,
      [createHash('sha256').update(token).digest()],
    ),
  );
  await journey('optional messages', async ({ enter }) => {
    const reader = await enter({ viewport: PHONE, javaScript: false });
    await reader.open(`/mail/off/${token}`);
    await reader.page.getByRole('button', { name: 'Turn these off' }).click();
    await reader.page.getByText('“Due soon” is turned off.').waitFor();

    const competitor = await enter({ viewport: DESK });
    const { page, open } = competitor;
    await competitor.signInAs('Wren Halloway');
    await open('/paddock/mail');
    await look(competitor, 'choose');
    expect(await page.getByLabel('Due soon').isChecked()).toBe(false);
    await page.getByLabel('Due soon').check();
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Saved.').waitFor();
    expect(await page.getByLabel('Due soon').isChecked()).toBe(true);
  });
});
