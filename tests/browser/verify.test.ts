import { PDFDocument } from 'pdf-lib';
import { expect, test } from 'vitest';
import { NOTICE_FILE_NAME } from '@/domain/ledger/verify/notice-file';
import { noticeFile } from '../domain/ledger/example';
import { journey, type Visitor } from '../support/browser';
import { readProduct } from '../support/product';
import { eventually } from '../support/wait';

interface Published {
  readonly slug: string;
  readonly number: string;
  readonly pdf: Uint8Array;
}

/** A notice of the demo data, once its PDF is made and the second line is under a signed head. */
const published = (): Promise<Published> =>
  eventually('a notice whose PDF is under a signed head', async () => {
    const { publicUrl } = readProduct();
    const home = await (await fetch(publicUrl)).text();
    for (const [, slug = ''] of home.matchAll(/href="\/series\/([^"/]+)"/g)) {
      const board = await (await fetch(`${publicUrl}/series/${slug}`)).text();
      const [, number] = /verdicts\/([0-9-]+)"/.exec(board) ?? [];
      if (number === undefined) continue;
      const proof = await fetch(`${publicUrl}/api/ledger/${slug}/notices/${number}/pdf`);
      const pdf = await fetch(`${publicUrl}/series/${slug}/verdicts/${number}.pdf`);
      if (!proof.ok || !pdf.ok) continue;
      return { slug, number, pdf: new Uint8Array(await pdf.arrayBuffer()) };
    }
    return undefined;
  });

const dropFile = async ({ page }: Visitor, bytes: Uint8Array, name = 'notice.pdf') => {
  const buffer = Buffer.from(bytes);
  const mimeType = name.endsWith('.pdf') ? 'application/pdf' : 'application/json';
  await page.getByLabel('A notice’s PDF').setInputFiles({ name, mimeType, buffer });
  const verdict = page.locator('[data-verdict]');
  await verdict.waitFor();
  return verdict;
};

const withFile = async (text: string): Promise<Uint8Array> => {
  const document = await PDFDocument.create();
  document.addPage([200, 200]);
  await document.attach(new TextEncoder().encode(text), NOTICE_FILE_NAME, {});
  return document.save();
};

test('a good PDF holds step by step, and so does its number', async () => {
  const { pdf, slug, number } = await published();
  await journey('verify good', async ({ enter }) => {
    const visitor = await enter();
    const { page } = visitor;
    await visitor.open('/verify');
    await visitor.expectAccessible();
    const verdict = await dropFile(visitor, pdf);
    expect(await verdict.getAttribute('data-verdict')).toBe('passed');
    expect(await verdict.getByRole('heading').textContent()).toMatch(/unchanged/);
    const outcomes = await page
      .locator('[data-step]')
      .evaluateAll((steps) => steps.map((step) => step.getAttribute('data-outcome')));
    expect(outcomes).toHaveLength(13);
    expect(new Set(outcomes)).toEqual(new Set(['passed']));
    await visitor.expectAccessible();
    await visitor.expectNoSidewaysScroll();
    await visitor.shot('verify-good');

    await visitor.open(`/verify?series=${slug}&number=${number}`);
    await page.locator('[data-verdict=passed]').waitFor();
    expect(await page.locator('[data-verdict]').textContent()).toContain(number);
  });
});

test('an altered PDF is caught, and so is one whose words were changed', async () => {
  const { pdf } = await published();
  await journey('verify altered', async ({ enter }) => {
    const visitor = await enter({ viewport: { width: 360, height: 740 } });
    await visitor.open('/verify');
    const altered = Uint8Array.from([...pdf, 0x0a]);
    const verdict = await dropFile(visitor, altered);
    expect(await verdict.getAttribute('data-verdict')).toBe('failed');
    expect(
      await visitor.page
        .locator('[data-outcome=failed]')
        .evaluateAll((steps) => steps.map((step) => step.getAttribute('data-step'))),
    ).toEqual(['pdf-committed']);
    await visitor.expectNoSidewaysScroll();
    await visitor.shot('verify-altered');
  });
});

test('a foreign PDF is not taken for one of ours', async () => {
  await journey('verify foreign', async ({ enter }) => {
    const visitor = await enter();
    await visitor.open('/verify');
    const blank = await PDFDocument.create();
    blank.addPage();
    const nothing = await dropFile(visitor, await blank.save());
    expect(await nothing.getByRole('heading').textContent()).toMatch(/carries no notice/);

    visitor.expectRefusal({ status: 404, url: /\/api\/ledger\/[0-9a-f-]+\/keys$/ });
    await visitor.open('/verify');
    const verdict = await dropFile(visitor, await withFile(await noticeFile()));
    expect(await verdict.getAttribute('data-verdict')).toBe('not checked');
    expect(await verdict.getByRole('heading').textContent()).toMatch(/not kept here/);
    await visitor.shot('verify-foreign');
  });
});

test('a rival reads the ledger without script, and finds heads, key, proofs and feed', async () => {
  const { slug } = await published();
  await journey('ledger', async ({ enter }) => {
    const visitor = await enter({ javaScript: false });
    const { page } = visitor;
    await visitor.open(`/series/${slug}/ledger`);
    expect(await page.locator('script').count()).toBe(0);
    expect(await page.locator('tbody tr').count()).toBeGreaterThan(5);
    expect(await page.locator('pre').first().textContent()).toMatch(
      /^tagwire\/[0-9a-f-]{36}\n\d+\n/,
    );
    await visitor.expectNoSidewaysScroll();
    await visitor.shot('ledger');
    // The newest lines come first: what others did since may have moved the verdict to an older page.
    const verdict = page.getByText('A verdict was published as a notice');
    while ((await verdict.count()) === 0)
      await page.getByRole('link', { name: 'Older lines' }).click();
    await verdict.first().waitFor();
    const { publicUrl } = readProduct();
    const feed = await (await fetch(`${publicUrl}/series/${slug}/ledger/feed.xml`)).text();
    expect(feed).toMatch(/<entry>[\s\S]*— tagwire\//);
  });
});
