import { create } from 'qrcode';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { receiptText } from '@/domain/ledger/receipt-text';
import { proveForNotice } from '@/services/ledger/proof/prove-for-notice';
import { sendMail } from '@/services/mail/send-mail';
import { openPaperwork } from '@/services/paperwork/read/open-paperwork';
import { SpyMailer } from '../../support/fakes';
import { handedIn, openPaddock, type Paddock } from '../../support/paperwork';
import { openRecordWorld, type RecordWorld } from '../../support/record';
import { must } from '../rulebook/build';

let world: RecordWorld;
let paddock: Paddock;

beforeAll(async () => {
  world = await openRecordWorld();
  paddock = await openPaddock(world);
});
afterAll(() => world.close());

/** The receipt as it goes out, with and without a signed head. */
const sendReceipt = async (signs: boolean) => {
  const mailer = new SpyMailer();
  const ports = () => world.ports({ mailer });
  const [mail] = await ports().db.execute<{ id: string }[]>(
    "select id from public.mail where kind = 'paperwork-receipt' and state = 'to-send'",
  );
  const findHead = async (seriesId: string, line: number) =>
    signs ? (await proveForNotice(ports(), seriesId, line)).proof.checkpoint : undefined;
  await sendMail(ports(), { mailId: mail?.id ?? '' }, findHead);
  const [sent] = mailer.sent;
  if (sent === undefined) throw new Error('Nothing was sent.');
  return sent.text;
};

describe('the receipt of paperwork', () => {
  it('names the line, the document’s hash and a signed head that covers the line', async () => {
    const { paperworkId } = await handedIn(paddock, '31');
    const text = await sendReceipt(true);
    const { db } = world.ports();
    const [line] = await db.execute<{ index: string; document: string; note: string }[]>(
      `select l.index, c.content as document, k.note from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
         and c.role = 'paperwork'
       join record.checkpoint k on k.series_id = l.series_id and k.size > l.index
       where l.line::jsonb #>> '{refs,paperwork}' = ?`,
      [paperworkId],
    );
    if (line === undefined) throw new Error('No signed line holds the paperwork.');
    const hash = toHex(sha256(utf8(line.document)));
    expect(text).toContain(`Receipt: line ${line.index} of the series’ ledger`);
    expect(text).toContain(`SHA-256 ${hash}`);
    expect(text).toContain(line.note.trimEnd());
    const { versions } = must(
      await openPaperwork(paddock.ports(), paddock.competitor, paperworkId),
    );
    expect(versions[0]).toMatchObject({ line: Number(line.index), hash });
  });

  it('goes out with line and hash where no head can be had', async () => {
    await handedIn(paddock, '32');
    const text = await sendReceipt(false);
    expect(text).toMatch(
      /Receipt: line \d+ of the series’ ledger holds this paperwork, SHA-256 [0-9a-f]{64}\./,
    );
    expect(text).not.toContain('signed head below');
  });

  it('says everything by itself in a code that a telephone reads off a screen', () => {
    const text = receiptText({
      series: 'Corran Valley Saturday Series',
      what: 'Paperwork of VR-2231, version 1',
      sha256: 'ab'.repeat(32),
      line: 7,
      at: '2026-07-11T20:00:00.000Z',
    });
    for (const part of ['Ledger line 7', 'ab'.repeat(32), '2026-07-11T20:00:00.000Z', 'version 1'])
      expect(text).toContain(part);
    expect(text).not.toContain('http');
    expect(create(text, { errorCorrectionLevel: 'M' }).modules.size).toBeLessThanOrEqual(77);
  });
});
