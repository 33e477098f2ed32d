import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { noticePrinter } from '@/adapters/pdf/notice-printer';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { parseLine } from '@/domain/ledger/line';
import { lineCommitsTo } from '@/domain/ledger/verify/check-opening';
import { sendMail } from '@/services/mail/send-mail';
import { renderNotice } from '@/services/notice/render-notice';
import type { OutgoingMail } from '@/services/ports';
import { findNotice } from '@/services/public/find-notice';
import { readPdf } from '../../support/pdf-text';
import { BIG_FEET, BREACH, NO_BREACH } from '../../support/verdict-case';
import { FakeObjects, openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { openWorld, type World } from '../../support/world';

let world: World;
let v: VerdictWorld;
const objects = new FakeObjects();
const sent: OutgoingMail[] = [];
const mailer = {
  send: async (mail: OutgoingMail) => {
    sent.push(mail);
    return '250 taken';
  },
};

beforeAll(async () => {
  world = await openWorld({ notices: noticePrinter, objects, mailer });
  v = await openVerdictWorld(world);
  world.clock.set('2026-07-12T14:20:00.000Z');
});
afterAll(() => world.close());

const publish = async (car: string, draft = BREACH, engine = BIG_FEET) => {
  const inspection = await v.addInspection(car);
  await v.sign(inspection, engine);
  const done = await v.decide(inspection, draft);
  if (!done.ok) throw new Error(done.failure.detail);
  return { ...done.value, verdict: { seriesId: v.seriesId, verdictId: done.value.verdictId } };
};

const found = async (number: string) => {
  const notice = await findNotice(world.ports(), { slug: 'corran-valley', number });
  if (notice === undefined) throw new Error('no notice');
  return notice;
};

const rows = <T>(sql: string, values: unknown[] = []) => world.ports().db.execute<T[]>(sql, values);

describe('printing a published notice', () => {
  it('keeps the PDF by its hash, records the hash in a line of its own and sends it to the competitor', async () => {
    const { number, verdict } = await publish('12J');
    expect((await found(number)).pdf).toBeNull();
    await renderNotice(world.ports(), verdict);
    const notice = await found(number);
    const bytes = objects.kept.get(notice.pdf?.objectKey ?? '');
    if (bytes === undefined) throw new Error('no PDF');
    const hash = sha256(bytes);
    expect(notice.pdf).toEqual({
      sha256: toHex(hash),
      bytes: bytes.length,
      objectKey: `notices/${toHex(hash)}.pdf`,
    });
    const [line] = await rows<{ line: string; salt: string }>(
      `select l.line, encode(c.salt, 'hex') as salt from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
       where l.kind = 'notice-pdf'`,
    );
    const parsed = parseLine(line?.line ?? '');
    if (!parsed.ok) throw new Error('no line');
    expect(parsed.value.refs['notice']).toBe(String(notice.index));
    expect(lineCommitsTo(parsed.value, 'pdf', line?.salt ?? '', hash)).toBe(true);
    expect(lineCommitsTo(parsed.value, 'pdf', line?.salt ?? '', sha256(utf8('x')))).toBe(false);

    const [mail] = await rows<{ id: string }>('select id from public.mail');
    await sendMail(world.ports(), { mailId: mail?.id ?? '' });
    expect(sent).toHaveLength(1);
    expect(sent[0]?.to).toMatch(/^wren\.halloway/);
    expect(sent[0]?.subject).toBe(
      `Corran Valley Saturday Series: notice ${number}, car 12J, breach`,
    );
    expect(sent[0]?.text).toContain(`/series/corran-valley/verdicts/${number}`);
    expect(sent[0]?.attachments).toMatchObject([
      { name: `notice-${number}.pdf`, type: 'application/pdf' },
    ]);
    expect(toHex(sha256(sent[0]?.attachments[0]?.bytes ?? new Uint8Array()))).toBe(toHex(hash));
  });

  it('prints number, clause, value, U with k, limit, rule and people, and carries the exact document', async () => {
    const { number, verdict } = await publish('13J');
    await renderNotice(world.ports(), verdict);
    const notice = await found(number);
    const pdf = readPdf(objects.kept.get(notice.pdf?.objectKey ?? '') ?? new Uint8Array());
    for (const part of [
      `Notice ${number}, published 12 July 2026, 09:20 local time`,
      'Car 13J breached clause 4.3 of class Street Eight',
      '0.0062 in ± 0.00009 in',
      '(k = 1.96)',
      'max 0.0010 in',
      '3 exhaust',
      'guard band of',
      'Edition 4 as amended by bulletin 2',
      'C-mic',
      'Oona Brannick, inspector',
      'Ilse Törnkvist, series official',
      'Provisional until Sunday 12 July 2026, 11:20 local time (UTC−5)',
      'bond of 250 USD',
      '1 of 2',
      '2 of 2',
    ]) {
      expect(pdf.text.replaceAll('\n', ' ')).toContain(part);
    }
    expect(pdf.text).not.toContain('0.0024');
    expect(pdf.pages).toBe(2);
    const attached = JSON.parse(pdf.attachments['notice.json'] ?? '{}') as Record<string, string>;
    expect(attached['document']).toBe(notice.document);
    expect(attached['salt']).toBe(notice.salt);
    expect(attached['line']).toBe(notice.line);
  });

  it('carries the whole proof once a signed head covers the line', async () => {
    const { number, verdict } = await publish('14J');
    await renderNotice(world.ports(), verdict, async (line) => ({
      proof: { line: `line ${line}`, path: [], checkpoint: 'head' },
      key: 'key',
      checkpoint: 418,
    }));
    const notice = await found(number);
    const pdf = readPdf(objects.kept.get(notice.pdf?.objectKey ?? '') ?? new Uint8Array());
    expect(pdf.text).toContain(`${notice.index}, under checkpoint 418`);
    const attached = JSON.parse(pdf.attachments['tagwire-notice.json'] ?? '{}') as object;
    expect(attached).toMatchObject({
      type: 'tagwire/notice',
      document: notice.document,
      proof: { checkpoint: 'head' },
    });
  });

  it('is done once, however often the job comes back, also at the same time', async () => {
    const { verdict } = await publish('15J', NO_BREACH, {});
    const counts = () =>
      rows<{ pdfs: string; lines: string; mails: string }>(
        `select (select count(*) from record.notice_pdf) as pdfs,
                (select count(*) from record.ledger_line where kind = 'notice-pdf') as lines,
                (select count(*) from public.mail) as mails`,
      );
    const [before] = await counts();
    await Promise.all(Array.from({ length: 4 }, () => renderNotice(world.ports(), verdict)));
    await renderNotice(world.ports(), verdict);
    const [after] = await counts();
    expect(Number(after?.pdfs) - Number(before?.pdfs)).toBe(1);
    expect(Number(after?.lines) - Number(before?.lines)).toBe(1);
    expect(Number(after?.mails) - Number(before?.mails)).toBe(1);
  });

  it('of a competitor without an account is printed and sent to nobody', async () => {
    const inspection = await v.addInspection('16J', null);
    await v.sign(inspection);
    const done = await v.decide(inspection, NO_BREACH);
    if (!done.ok) throw new Error(done.failure.detail);
    const [before] = await rows<{ n: string }>('select count(*) as n from public.mail');
    await renderNotice(world.ports(), { seriesId: v.seriesId, verdictId: done.value.verdictId });
    const [after] = await rows<{ n: string }>('select count(*) as n from public.mail');
    expect(after).toEqual(before);
    expect((await found(done.value.number)).pdf).not.toBeNull();
  });
});
