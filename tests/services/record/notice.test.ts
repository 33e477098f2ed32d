import { PDFDocument } from 'pdf-lib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { checkNotice } from '@/components/verify/check-notice';
import { readFile } from '@/components/verify/read-file';
import { checkBytes, checkNumber } from '@/components/verify/run-check';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { openCheckpoint } from '@/domain/ledger/checkpoint';
import { formatVerifierKey } from '@/domain/ledger/note/verifier-key';
import { NOTICE_FILE_NAME } from '@/domain/ledger/verify/notice-file';
import { findNoticeFile, findPdfFile } from '@/services/ledger/proof/find-notice-file';
import { findSeriesKeys } from '@/services/ledger/proof/list-keys';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { proveExtension } from '@/services/ledger/proof/prove-line';
import { renderNotice } from '@/services/notice/render-notice';
import { get } from '../../support/bay';
import { FakeObjects } from '../../support/fakes';
import {
  openRecordWorld,
  type RecordWorld,
  signerFrom,
  signNow,
  writeLine,
} from '../../support/record';
import { BIG_FEET, BREACH, NO_BREACH } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';

let world: RecordWorld;
let v: VerdictWorld;
let pdf: Uint8Array;
let verdictId: string;
const objects = new FakeObjects();

const decide = async (car: string, breach: boolean) => {
  const inspection = await v.addInspection(car);
  await v.sign(inspection, breach ? BIG_FEET : {});
  return get(await v.decide(inspection, breach ? BREACH : NO_BREACH));
};

const print = async (id: string) => {
  await renderNotice(world.ports(), { seriesId: v.seriesId, verdictId: id }, (line) =>
    proveForNotice(world.ports(), v.seriesId, line),
  );
  const [row] = await world
    .ports()
    .db.execute<{ object_key: string }[]>(
      'select object_key from record.notice_pdf where verdict_id = ?',
      [id],
    );
  return new Uint8Array(await objects.read(row?.object_key ?? '', 10_000_000));
};

beforeAll(async () => {
  world = await openRecordWorld({ notices: noticePrinter, objects });
  v = await openVerdictWorld(world);
  world.clock.set('2026-07-12T14:20:00.000Z');
  const published = await decide('12J', true);
  ({ verdictId } = published);
  pdf = await print(verdictId);
  await signNow(world.ports(), v.seriesId);
});
afterAll(() => world.close());

/** The public API's answers, from the services behind it. */
const ask = async (path: string): Promise<string | undefined> => {
  const url = new URL(path, 'http://127.0.0.1');
  const [, , , series = '', what = '', number = '', part] = url.pathname.split('/');
  if (series !== v.seriesId && series !== 'corran-valley') return undefined;
  const seriesId = v.seriesId;
  const asked = { seriesId, number: decodeURIComponent(number) };
  const text = async () => {
    if (what === 'keys') return JSON.stringify(await findSeriesKeys(world.ports(), seriesId));
    if (what === 'consistency') {
      const from = Number(url.searchParams.get('from'));
      return JSON.stringify(get(await proveExtension(world.ports(), { seriesId, from })));
    }
    const find = part === 'pdf' ? findPdfFile : findNoticeFile;
    const file = await find(world.ports(), asked);
    return file.ok ? file.value : undefined;
  };
  return text();
};

const failedSteps = (steps: readonly { id: string; outcome: string }[]) =>
  steps.filter(({ outcome }) => outcome !== 'passed').map(({ id, outcome }) => [id, outcome]);

const withAttachment = async (change: (text: string) => string): Promise<Uint8Array> => {
  const read = await readFile(pdf);
  if (read.kind !== 'notice') throw new Error('no notice');
  const other = await PDFDocument.create({ updateMetadata: false });
  other.addPage([200, 200]);
  const { v: version, type, ...rest } = read.file;
  const text = change(JSON.stringify({ v: version, type, ...rest }));
  await other.attach(new TextEncoder().encode(text), NOTICE_FILE_NAME, {});
  return other.save();
};

describe('a notice’s PDF', () => {
  it('carries document and proof under the first head that covers its line, and passes every step', async () => {
    const report = await checkBytes(pdf, '', ask);
    expect(failedSteps(report.steps)).toEqual([]);
    expect(report.outcome).toBe('passed');
    expect(report.steps.map(({ id }) => id)).toEqual([
      'key-known',
      'document-form',
      'document-committed',
      'line-form',
      'checkpoint-signed',
      'same-ledger',
      'line-included',
      'pdf-line-form',
      'pdf-checkpoint-signed',
      'pdf-same-ledger',
      'pdf-line-included',
      'pdf-committed',
      'only-appended',
    ]);
    expect(report.says.join(' ')).toContain('Car 12J breached');
  });

  it('passes with a key that the reader brings, and fails with another one', async () => {
    const own = formatVerifierKey(world.keys.signer(v.seriesId).key);
    expect((await checkBytes(pdf, own, ask)).outcome).toBe('passed');
    const { key } = signerFrom('somebody else', world.keys.signer(v.seriesId).key.name);
    const report = await checkBytes(pdf, formatVerifierKey(key), ask);
    expect(report.outcome).toBe('failed');
    expect(failedSteps(report.steps).map(([id]) => id)).toContain('checkpoint-signed');
  });

  it('altered by one byte is no longer the one that was recorded', async () => {
    const altered = Uint8Array.from(pdf);
    const at = Buffer.from(altered).lastIndexOf('%%EOF');
    const longer = Uint8Array.from([...altered.subarray(0, at), 0x0a, ...altered.subarray(at)]);
    const report = await checkBytes(longer, '', ask);
    expect(report.outcome).toBe('failed');
    expect(failedSteps(report.steps)).toEqual([['pdf-committed', 'failed']]);
  });

  it('with another sentence in the document is caught at the document', async () => {
    const forged = await withAttachment((text) => text.replace('breach', 'no-breach'));
    const report = await checkBytes(forged, '', ask);
    expect(failedSteps(report.steps)).toEqual(
      expect.arrayContaining([
        ['document-committed', 'failed'],
        ['pdf-committed', 'failed'],
      ]),
    );
  });

  it('of a series not kept here is not vouched for', async () => {
    const report = await checkBytes(pdf, '', async () => undefined);
    expect(report.outcome).toBe('not checked');
    expect(report.headline).toMatch(/not kept here/);
  });

  it('without an attached notice, or a file that is something else, says so', async () => {
    const blank = await PDFDocument.create();
    blank.addPage();
    expect((await checkBytes(await blank.save(), '', ask)).headline).toMatch(/carries no notice/);
    expect((await checkBytes(pdf.slice(0, 4000), '', ask)).headline).toMatch(/carries no notice/);
    const text = new TextEncoder().encode('{"hello":"world"}');
    expect((await checkBytes(text, '', ask)).headline).toMatch(/neither/);
  });

  it('is found by its number too, with the very file that the PDF carries', async () => {
    const read = await readFile(pdf);
    if (read.kind !== 'notice') throw new Error('no notice');
    const served = await ask(`/api/ledger/${v.seriesId}/notices/2026-001`);
    expect(JSON.parse(served ?? '')).toEqual(read.file);
    const report = await checkNumber('corran-valley', '2026-001', '', ask);
    expect(report.outcome).toBe('passed');
    expect((await checkNumber('corran-valley', '2026-999', '', ask)).headline).toMatch(/no notice/);
  });

  it('stays checkable from the old key, and from the new one, after a hand-over', async () => {
    const first = formatVerifierKey(world.keys.signer(v.seriesId).key);
    world.keys.previous = 'first';
    world.keys.current = 'second';
    await writeLine(world.ports(), v.seriesId, 'later');
    await signNow(world.ports(), v.seriesId);
    delete world.keys.previous;
    await writeLine(world.ports(), v.seriesId, 'later still');
    await signNow(world.ports(), v.seriesId);
    const followed = await checkBytes(pdf, first, ask);
    expect(failedSteps(followed.steps)).toEqual([]);
    expect(followed.keys).toHaveLength(2);
    expect((await checkBytes(pdf, '', ask)).outcome).toBe('passed');
    // A later notice is under the later key, which the first one leads to.
    const later = await print((await decide('31', false)).verdictId);
    await signNow(world.ports(), v.seriesId);
    expect((await checkBytes(later, first, ask)).outcome).toBe('passed');
    const second = formatVerifierKey(world.keys.signer(v.seriesId).key);
    expect((await checkBytes(later, second, ask)).outcome).toBe('passed');
  });

  it('is mailed with a receipt: the line, the notice’s hash and the signed head, byte for byte', async () => {
    const [mail] = await world
      .ports()
      .db.execute<{ content: { paragraphs: string[] } }[]>(
        "select content from public.mail where kind = 'verdict-published' order by created_at limit 1",
      );
    const read = await readFile(pdf);
    if (read.kind !== 'notice') throw new Error('no notice');
    const paragraphs = mail?.content.paragraphs ?? [];
    const line = JSON.parse(read.file.proof.line) as { index: string };
    const hash = toHex(sha256(utf8(read.file.document)));
    expect(paragraphs.at(-2)).toContain(`line ${line.index} of`);
    expect(paragraphs.at(-2)).toContain(hash);
    const { key: first } = signerFrom('first', world.keys.signer(v.seriesId).key.name);
    expect(openCheckpoint(`${paragraphs.at(-1)}\n`, [first]).ok).toBe(true);
    expect(`${paragraphs.at(-1)}\n`).toBe(read.file.proof.checkpoint);
  });

  it('is asked of the series whose line it carries, never of the name it gives', async () => {
    const asked: string[] = [];
    const read = await readFile(pdf);
    if (read.kind !== 'notice') throw new Error('no notice');
    await checkNotice({
      file: read.file,
      pinned: '',
      ask: async (path) => {
        asked.push(path);
        return undefined;
      },
    });
    expect(asked).toEqual([`/api/ledger/${v.seriesId}/keys`]);
  });
});
