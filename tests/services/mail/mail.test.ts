import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { lineWords } from '@/domain/ledger/line-words';
import { Mail } from '@/entities/people/mail';
import { listMails } from '@/services/mail/list-mails';
import { recordService } from '@/services/mail/record-service';
import { sendAgain } from '@/services/mail/send-again';
import { MOST_ATTEMPTS, sendMail } from '@/services/mail/send-mail';
import { takeBounce } from '@/services/mail/take-bounce';
import { chooseTopics, findTopicOfLink, listTopics, turnOffByLink } from '@/services/mail/turn-off';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { MailRefused } from '@/services/ports';
import { SpyMailer } from '../../support/fakes';
import { handedIn, openPaddock, type Paddock } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { must } from '../rulebook/build';

let world: World;
let paddock: Paddock;
let mailer: SpyMailer;
let car = 0;

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
});
beforeEach(() => {
  mailer = new SpyMailer();
});
afterAll(() => world.close());

const ports = () => world.ports({ mailer });
const mailOf = (id: string) => ports().db.findOneOrFail(Mail, { id });
const newest = async (kind: string): Promise<Mail> => {
  const [mail] = await ports().db.find(
    Mail,
    {
      kind,
      seriesId: paddock.seriesId,
      personId: { $in: [paddock.official.personId, paddock.competitor.personId] },
    },
    { orderBy: { createdAt: 'desc', id: 'desc' }, limit: 1 },
  );
  if (mail === undefined) throw new Error(`No mail of the kind ${kind}.`);
  return mail;
};
const send = (mailId: string) => sendMail(ports(), { mailId });
const handIn = () => {
  car += 1;
  return handedIn(paddock, String(car));
};

describe('handing in', () => {
  it('tells the officials that something waits, and nothing of what was declared', async () => {
    const { paperworkId } = await handIn();
    const mail = await newest('paperwork-to-check');
    expect(mail.personId).toBe(paddock.official.personId);
    await send(mail.id);
    const [sent] = mailer.sent;
    expect(sent?.subject).toMatch(/^Paperwork to check: car 1, /);
    expect(sent?.text).toContain('Next: look at it and accept it, or return it with remarks.');
    expect(sent?.text).toContain(
      `Check the paperwork: http://127.0.0.1:1/office/paperwork/${paperworkId}`,
    );
    for (const secret of ['0.8423', '361.4', '41-7730', 'VR-2231', 'Ada Lindqvist', 'lifters.jpg'])
      expect(`${sent?.subject}${sent?.text}${sent?.html}`).not.toContain(secret);
  });

  it('returned, the competitor is told what to do next with one link to it, as text and as HTML', async () => {
    const { paperworkId } = await handIn();
    must(
      await decidePaperwork(ports(), paddock.official, {
        act: paddock.uuid(),
        paperworkId,
        number: 1,
        decision: 'returned',
        remarks: [{ item: 'lifters-racked', text: 'Lay a scale <beside> it.' }],
      }),
    );
    await send((await newest('paperwork-returned')).id);
    const [sent] = mailer.sent;
    const link = `http://127.0.0.1:1/paddock/paperwork/${paperworkId}`;
    expect(sent?.text).toContain('Lay a scale <beside> it.');
    expect(sent?.text).toContain('Next: put it right and hand it in again.');
    expect(sent?.text).toContain(`Put it right: ${link}\n`);
    expect(sent?.html).toContain('Lay a scale &lt;beside&gt; it.');
    expect(sent?.html).toContain(`href="${link}"`);
    expect(sent?.text).toContain('Messages of this kind cannot be turned off.');
    expect(sent?.headers).toEqual({});
  });
});

describe('messages that can be turned off', () => {
  it('carry an address that does it without a sign-in; from then on none is sent', async () => {
    await handIn();
    const mail = await newest('paperwork-to-check');
    await send(mail.id);
    const [sent] = mailer.sent;
    expect(sent?.headers['List-Unsubscribe-Post']).toBe('List-Unsubscribe=One-Click');
    const [, token = ''] =
      /^<http:\/\/127\.0\.0\.1:1\/mail\/off\/([0-9a-f]{64})>$/.exec(
        sent?.headers['List-Unsubscribe'] ?? '',
      ) ?? [];
    expect(sent?.text).toContain(`/mail/off/${token}`);
    // Looked at by a program, it turns nothing off.
    expect(await findTopicOfLink(ports(), token)).toEqual({
      title: 'Paperwork to check',
      off: false,
    });
    expect(must(await turnOffByLink(ports(), token)).title).toBe('Paperwork to check');
    must(await turnOffByLink(ports(), token));
    expect(await findTopicOfLink(ports(), token)).toMatchObject({ off: true });
    expect(await turnOffByLink(ports(), 'f'.repeat(64))).toMatchObject({
      failure: { name: 'absent' },
    });

    await handIn();
    const next = await newest('paperwork-to-check');
    await send(next.id);
    expect(mailer.sent.length).toBe(1);
    expect((await mailOf(next.id)).state).toBe('turned-off');
  });

  it('are chosen by the person; what binds somebody is not among them', async () => {
    const { official } = paddock;
    must(
      await chooseTopics(ports(), official, { act: paddock.uuid(), on: ['paperwork-to-check'] }),
    );
    const topics = await listTopics(ports(), official);
    expect(topics.filter(({ on }) => on).map(({ id }) => id)).toEqual(['paperwork-to-check']);
    await handIn();
    const toCheck = await newest('paperwork-to-check');
    await send(toCheck.id);
    expect((await mailOf(toCheck.id)).state).toBe('sent');
    must(await chooseTopics(ports(), paddock.competitor, { act: paddock.uuid(), on: [] }));
    const receipt = await newest('paperwork-receipt');
    await send(receipt.id);
    expect((await mailOf(receipt.id)).state).toBe('sent');
  });
});

describe('a message that does not get through', () => {
  it('is tried again under the same Message-ID, and given up after the last try', async () => {
    await handIn();
    const { id, messageId } = await newest('paperwork-receipt');
    mailer.troubles.push(
      ...Array.from({ length: MOST_ATTEMPTS }, () => new Error('connection lost')),
    );
    for (let i = 1; i < MOST_ATTEMPTS; i += 1) {
      await expect(send(id)).rejects.toThrow('connection lost');
      expect(await mailOf(id)).toMatchObject({ state: 'failed', attempts: i });
    }
    await send(id);
    expect(await mailOf(id)).toMatchObject({ state: 'given-up', lastError: 'connection lost' });
    await send(id);
    expect(mailer.sent).toEqual([]);
    must(
      await sendAgain(ports(), paddock.official, {
        act: paddock.uuid(),
        seriesId: paddock.seriesId,
        mailId: id,
      }),
    );
    await send(id);
    await send(id);
    expect(mailer.sent.map((one) => one.messageId)).toEqual([messageId]);
  });

  it('refused for good is not tried again; the words are kept for the officials alone', async () => {
    await handIn();
    const { id } = await newest('paperwork-receipt');
    mailer.troubles.push(new MailRefused('550 5.1.1 no such mailbox'));
    await send(id);
    expect(await mailOf(id)).toMatchObject({ state: 'refused', attempts: 1 });
    const listed = must(
      await listMails(ports(), paddock.official, { seriesId: paddock.seriesId, troubled: true }),
    );
    expect(listed.mails.find((mail) => mail.id === id)).toMatchObject({
      kind: 'Receipt of paperwork',
      person: 'Ada Lindqvist',
      answer: '550 5.1.1 no such mailbox',
      mustBeServed: true,
      served: null,
    });
    expect(JSON.stringify(listed)).not.toContain('0.8423');
    for (const other of [paddock.competitor, paddock.rival]) {
      const { seriesId } = paddock;
      const act = paddock.uuid();
      for (const answer of [
        await listMails(ports(), other, { seriesId, troubled: false }),
        await sendAgain(ports(), other, { act, seriesId, mailId: id }),
        await recordService(ports(), other, {
          act,
          seriesId,
          mailId: id,
          how: 'x',
          servedAt: '2026-07-11T19:00:00Z',
        }),
      ])
        expect(answer).toMatchObject({ failure: { name: 'absent' } });
    }
  });
});

const report = (messageId: string, action = 'failed') => `Content-Type: multipart/report; boundary=b

--b
Content-Type: message/delivery-status

Reporting-MTA: dns; relay.example

Final-Recipient: rfc822; somebody@example.org
Action: ${action}
Status: 5.2.1
Diagnostic-Code: smtp; 550 mailbox closed

--b
Content-Type: text/rfc822-headers

Message-ID: ${messageId}

--b--
`;

describe('a report of a message that came back', () => {
  it('marks that message alone, twice as once', async () => {
    await handIn();
    const receipt = await newest('paperwork-receipt');
    const other = await newest('paperwork-to-check');
    await send(receipt.id);
    await send(other.id);
    expect(
      must(await takeBounce(ports(), { message: report(receipt.messageId, 'delayed') })),
    ).toEqual({ noted: false });
    expect(must(await takeBounce(ports(), { message: report('<unknown@example.org>') }))).toEqual({
      noted: false,
    });
    expect((await mailOf(receipt.id)).state).toBe('sent');
    expect(must(await takeBounce(ports(), { message: report(receipt.messageId) }))).toEqual({
      noted: true,
    });
    expect(must(await takeBounce(ports(), { message: report(receipt.messageId) }))).toEqual({
      noted: false,
    });
    expect(await mailOf(receipt.id)).toMatchObject({
      state: 'bounced',
      answer: '5.2.1 550 mailbox closed',
    });
    expect((await mailOf(other.id)).state).toBe('sent');
    expect(await takeBounce(ports(), { message: 'Subject: hello\n\nhello' })).toMatchObject({
      failure: { name: 'unsupported-file' },
    });
  });

  it('of one that binds somebody: an official serves it otherwise, kept in the record with its line', async () => {
    const { id, messageId } = await newest('paperwork-receipt');
    const shared = { seriesId: paddock.seriesId, mailId: id };
    const find = async () =>
      must(
        await listMails(ports(), paddock.official, { seriesId: paddock.seriesId, troubled: true }),
      ).mails.find((mail) => mail.id === id);
    expect(await find()).toMatchObject({ state: 'bounced', mustBeServed: true });
    const wrong = await recordService(ports(), paddock.official, {
      ...shared,
      act: paddock.uuid(),
      how: ' ',
      servedAt: '2026-07-12T09:00:00Z',
    });
    expect(wrong).toMatchObject({
      failure: { faults: [{ pointer: '/how' }, { pointer: '/servedAt' }] },
    });
    must(
      await recordService(ports(), paddock.official, {
        ...shared,
        act: paddock.uuid(),
        how: 'Handed over in bay 2, before a witness.',
        servedAt: '2026-07-11T19:30:00Z',
      }),
    );
    expect(await find()).toMatchObject({
      mustBeServed: false,
      served: { how: 'Handed over in bay 2, before a witness.', at: '2026-07-11T19:30:00Z' },
    });
    const [line] = await ports().db.execute<{ kind: string; content: string; open: boolean }[]>(
      `select l.kind, c.content, c.open from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index and c.role = 'service'
       where l.series_id = ? order by l.index desc limit 1`,
      [paddock.seriesId],
    );
    expect(lineWords(line?.kind ?? '')).toBe(
      'Somebody whom a message did not reach was served otherwise.',
    );
    expect(line?.open).toBe(false);
    expect(JSON.parse(line?.content ?? '{}')).toMatchObject({
      message: messageId,
      how: 'Handed over in bay 2, before a witness.',
    });
    await expect(
      ports().db.execute('update record.served_otherwise set how = ?', ['never']),
    ).rejects.toThrow('permission denied');
  });
});
