import { expect, it } from 'vitest';
import { readDeliveryReport } from '@/domain/mail/read-bounce';

const ID = '<01a230f3-da65-76d1-8538-0a933bcf5ad7@tagwire.example>';

/** Made by the grammar of RFC 6522, section 3, and RFC 3464, section 2. */
const report = (
  status: string,
  returned = `message/rfc822\n\nMessage-ID: ${ID}\nSubject: Notice 1\n\nText.`,
) =>
  [
    'Return-Path: <>',
    'From: postmaster@relay.example',
    'Subject: Undelivered Mail Returned to Sender',
    'MIME-Version: 1.0',
    'Content-Type: multipart/report; report-type=delivery-status;',
    '\tboundary="part/of=report"',
    '',
    'For programs that know no MIME.',
    '',
    '--part/of=report',
    'Content-Type: text/plain; charset=utf-8',
    '',
    'It could not be delivered. --part/of=report is no boundary here.',
    '',
    '--part/of=report',
    'Content-Description: Delivery report',
    'Content-Type: message/delivery-status',
    '',
    status,
    '--part/of=report',
    `Content-Type: ${returned}`,
    '',
    '--part/of=report--',
    'Message-ID: <after-the-end@example.org>',
  ].join('\n');

const FAILED = `Reporting-MTA: dns; relay.example
Arrival-Date: Sat, 11 Jul 2026 20:00:00 +0000

Final-Recipient: rfc822; Wren.Halloway@example.org
Original-Recipient: rfc822;wren.halloway@example.org
Action: failed
Status: 5.1.1
Remote-MTA: dns; mx.example.org
Diagnostic-Code: smtp; 550 5.1.1 <wren.halloway@example.org>:
    no such mailbox
`;

it('reads who did not get which message, and why, in the other server’s words', () => {
  expect(readDeliveryReport(report(FAILED))).toEqual({
    messageIds: [ID],
    recipients: [
      {
        address: 'wren.halloway@example.org',
        action: 'failed',
        status: '5.1.1',
        words: '550 5.1.1 <wren.halloway@example.org>: no such mailbox',
      },
    ],
  });
});

it('reads it with the line ends of the wire', () => {
  const wire = report(FAILED).replaceAll('\n', '\r\n');
  expect(readDeliveryReport(wire)).toEqual(readDeliveryReport(report(FAILED)));
});

it('reads a report that returns the head alone, and one that names the message in its own head', () => {
  const head = report(FAILED, `text/rfc822-headers\n\nSubject: Notice 1\nMessage-Id:\n ${ID}`);
  expect(readDeliveryReport(head)?.messageIds).toEqual([ID]);
  const own = report(FAILED, 'text/plain\n\nNothing').replace(
    'Subject:',
    `In-Reply-To: ${ID}\nSubject:`,
  );
  expect(readDeliveryReport(own)?.messageIds).toEqual([ID]);
});

it('tells a delay, and several recipients, apart', () => {
  const delayed = FAILED.replace('Action: failed', 'Action: delayed').replace(
    '5.1.1\nRemote',
    '4.4.1\nRemote',
  );
  const both = `${delayed}\nFinal-Recipient: rfc822; other@example.org\nAction: delivered\nStatus: 2.0.0\n`;
  expect(
    readDeliveryReport(report(both))?.recipients.map(({ address, action, status }) => [
      address,
      action,
      status,
    ]),
  ).toEqual([
    ['wren.halloway@example.org', 'delayed', '4.4.1'],
    ['other@example.org', 'delivered', '2.0.0'],
  ]);
});

it.each([
  ['a plain message', 'Subject: Out of office\n\nBack on Monday.'],
  ['nothing', ''],
  [
    'a message that only talks of it',
    'Content-Type: text/plain\n\nContent-Type: message/delivery-status\n\nAction: failed',
  ],
  [
    'a report without its parts',
    'Content-Type: multipart/report; report-type=delivery-status\n\nAction: failed',
  ],
])('finds no report in %s', (_, message) => {
  expect(readDeliveryReport(message)).toBeUndefined();
});

it('counts no recipient whose field is not whole', () => {
  expect(readDeliveryReport(report('Action: failed\nStatus: 5.0.0\n'))?.recipients).toEqual([]);
  expect(
    readDeliveryReport(report('Final-Recipient: rfc822; a@b\nAction: eaten\n'))?.recipients,
  ).toEqual([]);
});
