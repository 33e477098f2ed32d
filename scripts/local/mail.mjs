import { createHash, randomUUID } from 'node:crypto';
import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { answer, css, escapeHtml, host, listen, page } from './listen.mjs';

/**
 * @typedef {object} CaughtAttachment
 * @property {string} name
 * @property {string} type
 * @property {number} size
 * @property {string} sha256
 */

/**
 * A message as the mailbox lists it. `to` holds the envelope's addresses, lower case.
 *
 * @typedef {object} CaughtMail
 * @property {string} id
 * @property {string} receivedAt
 * @property {string} from
 * @property {string[]} to
 * @property {string} subject
 * @property {string} messageId
 * @property {string} text
 * @property {string[]} links every web address in the text, in order
 * @property {CaughtAttachment[]} attachments
 */

const largest = 26_214_400;

/** @type {Readonly<Record<string, { code: number, words: string }>>} */
const refusals = {
  'no-such-mailbox': { code: 550, words: '5.1.1 There is no such mailbox here' },
  'full-mailbox': { code: 452, words: '4.2.2 The mailbox is full' },
};

/** @param {string} text */
const linksIn = (text) => text.match(/https?:\/\/[^\s<>"')\]]+/g) ?? [];

/**
 * @param {string} id
 * @param {Buffer} source
 * @param {readonly string[]} to
 * @returns {Promise<CaughtMail>}
 */
async function describe(id, source, to) {
  const mail = await simpleParser(source);
  const text = mail.text ?? '';
  return {
    id,
    receivedAt: new Date().toISOString(),
    from: mail.from?.text ?? '',
    to: to.map((address) => address.toLowerCase()),
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? '',
    text,
    links: [...new Set(linksIn(text))],
    attachments: mail.attachments.map((attachment) => ({
      name: attachment.filename ?? '',
      type: attachment.contentType,
      size: attachment.size,
      sha256: createHash('sha256').update(attachment.content).digest('hex'),
    })),
  };
}

/** @param {CaughtMail} mail */
const row = (mail) =>
  `<tr><td>${escapeHtml(mail.receivedAt.slice(0, 19).replace('T', ' '))}</td><td>${escapeHtml(mail.to.join(', '))}</td>
<td><a href="/messages/${mail.id}">${escapeHtml(mail.subject || 'no subject')}</a></td></tr>`;

/** @param {string} text */
const linked = (text) =>
  escapeHtml(text).replace(
    /https?:\/\/[^\s<>]+?(?=&#(?:34|39|60|62);|[\s)\]]|$)/g,
    (url) => `<a href="${url}">${url}</a>`,
  );

/** @param {CaughtMail} mail */
const shown = (mail) =>
  page(
    mail.subject || 'no subject',
    `<p>From ${escapeHtml(mail.from)}<br>To ${escapeHtml(mail.to.join(', '))}</p><pre>${linked(mail.text)}</pre>
<ul>${mail.attachments
      .map(
        (file, at) =>
          `<li><a href="/messages/${mail.id}/attachments/${at}">${escapeHtml(file.name)}</a> (${file.size} bytes)</li>`,
      )
      .join(
        '',
      )}</ul><p><a href="/messages/${mail.id}.eml">The message as it was sent</a> · <a href="/">All messages</a></p>`,
  );

/**
 * Takes every message that is sent to it and delivers none: each is kept as an `.eml` file, listed in
 * `index.json`, and shown on a page. Whatever stands behind the @, `no-such-mailbox` is refused for good
 * and `full-mailbox` for now.
 *
 * - `GET /messages.json[?to=address]`: `CaughtMail[]`, oldest first
 * - `GET /messages/<id>`, `/messages/<id>.eml`, `/messages/<id>/attachments/<number>`
 *
 * @param {object} options
 * @param {number} options.smtpPort 0 for any
 * @param {number} options.pagePort 0 for any
 * @param {string} options.folder
 * @returns {Promise<{ smtpUrl: string, url: string, stop: () => Promise<void> }>}
 */
export async function startMailCatcher({ smtpPort, pagePort, folder }) {
  mkdirSync(folder, { recursive: true });
  const indexFile = join(folder, 'index.json');
  /** @type {CaughtMail[]} */
  const mails = readIndex(indexFile);

  /** @param {string} id */
  const sourceOf = (id) => readFileSync(join(folder, `${id}.eml`));

  /**
   * @param {Buffer} source
   * @param {readonly string[]} to
   */
  const keep = async (source, to) => {
    const id = randomUUID();
    const mail = await describe(id, source, to);
    writeFileSync(join(folder, `${id}.eml`), source, { mode: 0o600 });
    mails.push(mail);
    writeFileSync(`${indexFile}.draft`, JSON.stringify(mails, null, 1), { mode: 0o600 });
    renameSync(`${indexFile}.draft`, indexFile);
  };

  const smtp = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: largest,
    // Mailboxes to try refusals with.
    onRcptTo: ({ address }, _session, done) => {
      const refusal = refusals[address.split('@')[0]?.toLowerCase() ?? ''];
      done(refusal && Object.assign(new Error(refusal.words), { responseCode: refusal.code }));
    },
    onData: (stream, session, done) => {
      /** @type {Buffer[]} */
      const chunks = [];
      stream.on('data', (chunk) => chunks.push(chunk));
      stream.on('end', () => {
        if (stream.sizeExceeded) {
          done(Object.assign(new Error('message too large'), { responseCode: 552 }));
          return;
        }
        const to = session.envelope.rcptTo.map(({ address }) => address);
        keep(Buffer.concat(chunks), to).then(() => done(), done);
      });
    },
  });
  // A client that hangs up in the middle is no reason to stop.
  smtp.on('error', () => undefined);
  await /** @type {Promise<void>} */ (
    new Promise((resolve) => smtp.listen(smtpPort, host, resolve))
  );
  const address = /** @type {import('node:net').AddressInfo} */ (smtp.server.address());

  const web = await listen(pagePort, (request, response) => {
    respond(new URL(request.url ?? '/', 'http://mailbox.invalid'), response).catch((error) =>
      answer(response, 500, 'text/plain; charset=utf-8', String(error)),
    );
  });

  /**
   * @param {URL} url
   * @param {import('node:http').ServerResponse} response
   */
  async function respond(url, response) {
    const html = 'text/html; charset=utf-8';
    if (url.pathname === '/plain.css') return answer(response, 200, 'text/css', css);
    if (url.pathname === '/messages.json') {
      const to = url.searchParams.get('to')?.toLowerCase();
      const found = to === undefined ? mails : mails.filter((mail) => mail.to.includes(to));
      return answer(response, 200, 'application/json', JSON.stringify(found));
    }
    if (url.pathname === '/') {
      const rows = mails.toReversed().map(row).join('');
      const body = `<p>Nothing is delivered: every message sent by this Tagwire is kept here.</p>
<table><thead><tr><th>Received (UTC)</th><th>To</th><th>Subject</th></tr></thead><tbody>${rows}</tbody></table>`;
      return answer(response, 200, html, page('Local mailbox', body));
    }
    const [, id = '', rest = ''] = /^\/messages\/([0-9a-f-]{36})(.*)$/.exec(url.pathname) ?? [];
    const mail = mails.find((one) => one.id === id);
    if (mail !== undefined && rest === '') return answer(response, 200, html, shown(mail));
    if (mail !== undefined && rest === '.eml') {
      return answer(response, 200, 'text/plain; charset=utf-8', sourceOf(id));
    }
    const at = /^\/attachments\/(\d+)$/.exec(rest)?.[1];
    if (mail !== undefined && at !== undefined) {
      const attachment = (await simpleParser(sourceOf(id))).attachments[Number(at)];
      if (attachment !== undefined) {
        return answer(response, 200, attachment.contentType, attachment.content);
      }
    }
    return answer(response, 404, 'text/plain; charset=utf-8', 'There is no such message.');
  }

  return {
    smtpUrl: `smtp://${host}:${address.port}`,
    url: web.url,
    stop: async () => {
      await Promise.all([
        web.stop(),
        /** @type {Promise<void>} */ (new Promise((resolve) => smtp.close(() => resolve()))),
      ]);
    },
  };
}

/**
 * @param {string} file
 * @returns {CaughtMail[]}
 */
function readIndex(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return [];
    throw error;
  }
}
