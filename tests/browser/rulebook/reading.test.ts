import jsQR from 'jsqr';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { journey, type Visitor } from '../../support/browser';
import { readPdf } from '../../support/pdf-text';
import { readProduct } from '../../support/product';
import { OFFICIAL, openClassInForce, publishFromEditor, ready, sent, settled } from './steps';

const bytesOf = async (path: string): Promise<Uint8Array> => {
  const response = await fetch(new URL(path, readProduct().publicUrl));
  expect([path, response.status]).toEqual([path, 200]);
  return new Uint8Array(await response.arrayBuffer());
};
const textOf = async (path: string) => new TextDecoder().decode(await bytesOf(path));

/** A bulletin that replaces the words of clause 4.4, from a moment as it is typed. */
const amendByHand = async (
  { page }: Visitor,
  office: string,
  words: string,
  from: string,
  atTheClock?: () => Promise<void>,
) => {
  await page.getByRole('button', { name: 'Write a bulletin' }).click();
  await page.waitForURL(/\/draft\//);
  await ready(page);
  await page.getByLabel('Title').fill(words);
  await page.getByLabel('Reason').fill('To be clear.');
  await page.getByLabel('It counts').selectOption('instant');
  const field = page.getByRole('textbox', { name: 'From' });
  await field.fill(from);
  await field.press('Enter');
  await atTheClock?.();
  await page.getByLabel('Clause in force').selectOption('4.4');
  await page.getByRole('button', { name: 'Change this clause' }).click();
  await page.getByLabel('Words', { exact: true }).fill(words);
  await page.getByRole('heading', { name: 'Nothing is ambiguous' }).waitFor();
  await sent(page);
  await publishFromEditor(page, office);
};

/** The same over the API, as a program of the official's would do it. */
const amend = async (
  { page }: Visitor,
  { office, address }: { readonly office: string; readonly address: string },
  words: string,
  effective: object,
) => {
  const { clauses } = JSON.parse(await textOf(`${address}/rulebook.json`)) as {
    clauses: { number: string }[];
  };
  const clause = { ...clauses.find((one) => one.number === '4.4'), words };
  const changes = [{ kind: 'replace', clause }];
  const content = { title: words, reason: 'To be clear.', changes, effective };
  const statuses = await page.evaluate(
    async ([path, sending]) => {
      const id = () => crypto.randomUUID();
      const post = async (to: string, body: object) => {
        const answer = await fetch(to, {
          method: 'POST',
          headers: { 'content-type': 'application/json' },
          body: JSON.stringify({ act: id(), ...body }),
        });
        // Taken whole: a page that is left drops what it has not read.
        await answer.arrayBuffer();
        return answer;
      };
      const draft = id();
      const opened = await post(path as string, { id: draft, kind: 'bulletin', content: sending });
      const done = await post(`/api/rulebooks/drafts/${draft}/publish`, { version: 1 });
      return [opened.status, done.status];
    },
    [`/api/rulebooks/classes/${office.split('/').at(-1)}/drafts`, content] as const,
  );
  expect(statuses).toEqual([200, 200]);
};

/** The Sunday on which the clocks of the demo series' zone change next year: the nth of a month. */
const changeDay = (month: number, nth: number): string => {
  const year = new Date().getFullYear() + 1;
  const first = new Date(Date.UTC(year, month - 1, 1)).getUTCDay();
  const day = ((7 - first) % 7) + 1 + (nth - 1) * 7;
  return `${year}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
};

test('the rules on a day are exact to the second, over midnight and over both changes of the clocks', async () => {
  await journey('as of a date', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const { office, address } = await openClassInForce(
      official,
      `Dated ${Date.now().toString(36)}`,
    );
    const year = new Date().getFullYear() + 1;
    const spring = changeDay(3, 2);
    const autumn = changeDay(11, 1);
    const night = `${year}-07-01`;
    // Typed as in the zone: a skipped hour lies after the jump.
    await amendByHand(official, office, 'After the jump.', `${spring} 02:30`);
    const at = (instant: string) => ({ kind: 'instant', at: instant });
    const book = { office, address };
    await amend(official, book, 'Over midnight.', at(`${night}T05:00:00.000Z`));
    // A repeated hour asks which of the two is meant; what the rules are is told by both bulletins.
    const pass = () => official.page.getByLabel('The clocks show 01:30 twice that night');
    await amendByHand(official, office, 'The first time.', `${autumn} 01:30`, async () => {
      expect(await pass().locator('option:checked').textContent()).toContain('The second time');
      await pass().selectOption({ label: 'The first time: before they go back' });
    });
    await amendByHand(official, office, 'The second time.', `${autumn} 01:30`, () =>
      pass().waitFor(),
    );

    const feed = await textOf(`${address}/feed.xml`);
    const counts = [...feed.matchAll(/Counts from (\S+)\./g)].map(([, at]) => at);
    expect(counts.slice(0, 4)).toEqual([
      `${autumn}T07:30:00.000Z`,
      `${autumn}T06:30:00.000Z`,
      `${night}T05:00:00.000Z`,
      `${spring}T08:30:00.000Z`,
    ]);

    const reader = await enter();
    const wordsOn = async (on: string) => {
      await reader.open(`${address}?on=${on}`);
      return reader.page.locator('[id="4.4"] .rule-words').textContent();
    };
    const original = await wordsOn(`${spring}T01:59:59`);
    for (const [on, words] of [
      [`${spring}T03:29:59`, original],
      [`${spring}T03:30:00`, 'After the jump.'],
      [`${year}-06-30T23:59:59`, 'After the jump.'],
      [`${night}T00:00:00`, 'Over midnight.'],
      [`${autumn}T00:59:59`, 'Over midnight.'],
      // Both passes of the repeated hour, told apart as instants.
      [`${autumn}T06:29:59.999Z`, 'Over midnight.'],
      [`${autumn}T06:30:00.000Z`, 'The first time.'],
      [`${autumn}T07:29:59.999Z`, 'The first time.'],
      [`${autumn}T07:30:00.000Z`, 'The second time.'],
      [`${autumn}T02:00:00`, 'The second time.'],
    ] as const) {
      expect([on, await wordsOn(on)]).toEqual([on, words]);
    }
    expect(original).not.toBe('After the jump.');
    await reader.expectAccessible();
    await reader.expectNoSidewaysScroll();
    await wordsOn(night);
    expect(await reader.page.locator('main').textContent()).toContain('As of');
    await wordsOn('soon');
    expect(await reader.page.getByRole('alert').textContent()).toContain('is no day');
    // A day on which the rules change later says so, and leads to its end.
    await wordsOn(spring);
    await reader.page.getByRole('link', { name: 'see them at its end' }).click();
    const end = reader.page.locator('[id="4.4"] .rule-words');
    expect(await end.textContent()).toBe('After the jump.');

    await reader.open(`${address}/changes?from=${year}-06-30T23:59:59&to=${autumn}T02:00:00`);
    const change = reader.page.locator('article.entry');
    expect(await change.count()).toBe(1);
    expect(await change.locator('del').textContent()).toContain('After the jump.');
    expect(await change.locator('ins').textContent()).toContain('The second time.');
    expect(await change.textContent()).not.toContain('Over midnight.');
    await reader.expectAccessible();
    await reader.expectNoSidewaysScroll();
  });
});

test('the hash is the same on page, paper and file; the paper and each clause lead back by their code', async () => {
  await journey('hash, paper and code', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const name = `Printed ${Date.now().toString(36)}`;
    const { office, address } = await openClassInForce(official, name);
    const { publicUrl } = readProduct();
    const document = await bytesOf(`${address}/rules.json`);
    const hash = toHex(sha256(document));

    const reader = await enter();
    const { page } = reader;
    await reader.open(address);
    await settled(page);
    expect(await page.locator('main').textContent()).toContain(hash);
    const paper = readPdf(await bytesOf(`${address}/rulebook.pdf`));
    const words = paper.text.replace(/\s+/g, '');
    expect(words).toContain(hash.slice(0, 32));
    expect(words).toContain(hash.slice(32));
    expect(words).toContain(`1of${paper.pages}`);

    await page.locator('[id="4.4"] a.num').click();
    const code = page.getByRole('img', { name: 'Address of clause 4.4' });
    const { data, info } = await sharp(await code.screenshot())
      .ensureAlpha()
      .raw()
      .toBuffer({ resolveWithObject: true });
    const read = jsQR(new Uint8ClampedArray(data), info.width, info.height)?.data;
    expect(read).toBe(`${publicUrl}${address}/clauses/4.4`);
    expect(await page.locator('main').textContent()).toContain(read);
    await reader.shot('clause');

    // A bulletin at once: page, file and paper change together, and the old address keeps the old rules.
    await amend(official, { office, address }, 'Bores are as cast.', { kind: 'safety' });
    await reader.open(address);
    const now = toHex(sha256(await bytesOf(`${address}/rules.json`)));
    expect(now).not.toBe(hash);
    expect(await page.locator('main').textContent()).toContain(now);
    expect(await page.locator('[id="4.4"]').textContent()).toContain('Bores are as cast.');
    const reprinted = readPdf(await bytesOf(`${address}/rulebook.pdf`)).text.replace(/\s+/g, '');
    expect(reprinted).toContain(now.slice(0, 32));
    expect(reprinted).not.toContain(hash.slice(0, 32));
    await reader.open(read ?? '');
    expect(await page.locator('main').textContent()).toContain('Bores are as cast.');

    await reader.open(`${address}?find=as+cast`);
    expect(await page.locator('article.rule').count()).toBe(1);
    expect(await page.getByRole('status').textContent()).toContain('1 of');
  });
});

test('the feed names everything that was published, and its links can be followed', async () => {
  await journey('feed of rules', async ({ enter }) => {
    const official = await enter();
    await official.signInAs(OFFICIAL);
    const name = `Fed ${Date.now().toString(36)}`;
    const { office, address } = await openClassInForce(official, name);
    await amend(official, { office, address }, 'Clear <and> & clean.', { kind: 'safety' });
    const reader = await enter();
    const { page } = reader;
    await reader.open(address);
    const link = page.locator('link[type="application/atom+xml"]');
    const feed = await textOf((await link.getAttribute('href')) ?? '');
    const parsed = await page.evaluate((text) => {
      const xml = new DOMParser().parseFromString(text, 'application/xml');
      const all = (parent: Document | Element, tag: string) => [
        ...parent.getElementsByTagNameNS('http://www.w3.org/2005/Atom', tag),
      ];
      return {
        wrong: xml.getElementsByTagName('parsererror').length,
        updated: all(xml, 'updated')[0]?.textContent,
        entries: all(xml, 'entry').map((entry) => ({
          title: all(entry, 'title')[0]?.textContent,
          link: all(entry, 'link')[0]?.getAttribute('href'),
          updated: all(entry, 'updated')[0]?.textContent,
        })),
      };
    }, feed);
    expect(parsed.wrong).toBe(0);
    expect(parsed.entries.map((one) => one.title)).toEqual([
      'Bulletin 1: Clear <and> & clean.',
      expect.stringMatching(/^Edition 1: /),
    ]);
    expect(parsed.updated).toBe(parsed.entries[0]?.updated);
    await reader.open(parsed.entries[0]?.link ?? '');
    await page.getByRole('heading', { name: 'Bulletin 1' }).waitFor();
    expect(await page.locator('main').textContent()).toContain('Clear <and> & clean.');
    await reader.expectAccessible();
  });
});
