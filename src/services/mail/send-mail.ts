import { topicOf } from '@/domain/mail/mail-topics';
import { Mail } from '@/entities/people/mail';
import { MailRefused, type Ports } from '../ports';
import { findOff } from './find-off';
import type { NewMail } from './queue-mail';
import { type FindHead, receiptParagraphs } from './receipt';
import { renderMail } from './render-mail';

const MOST_ATTACHMENT_BYTES = 8_000_000;
/** As often as a job is tried. */
export const MOST_ATTEMPTS = 13;
const MOST_WORDS = 500;

type Content = Pick<NewMail, 'paragraphs' | 'next' | 'link' | 'receipt'> & {
  readonly attachments: NonNullable<NewMail['attachments']>;
};

const wordsOf = (error: unknown): string =>
  (error instanceof Error ? error.message : 'unknown').slice(0, MOST_WORDS);

/**
 * Sends one message. A thrown error makes the job come back later, less and less often; a message that
 * was sent, refused for good or turned off is not tried again.
 */
export const sendMail = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'mailer' | 'objects' | 'site'>,
  { mailId }: { readonly mailId: string },
  findHead: FindHead = async () => undefined,
): Promise<void> => {
  const mail = await deps.db.findOneOrFail(Mail, { id: mailId });
  if (mail.state !== 'to-send' && mail.state !== 'failed') return;
  const become = async (change: Partial<Mail>) => {
    Object.assign(mail, { lastError: null, changedAt: deps.clock.now(), ...change });
    await deps.db.flush();
  };
  const topic = topicOf(mail.kind);
  const off = topic && mail.personId ? await findOff(deps, mail.personId, topic) : undefined;
  if (off === 'turned-off') return become({ state: 'turned-off' });
  mail.attempts += 1;
  const content = mail.content as unknown as Content;
  try {
    const attachments = [];
    for (const { name, type, objectKey } of content.attachments) {
      const bytes = await deps.objects.read(objectKey, MOST_ATTACHMENT_BYTES);
      attachments.push({ name, type, bytes });
    }
    const receipt =
      content.receipt && (await receiptParagraphs(deps.db, content.receipt, findHead));
    const paragraphs = [...content.paragraphs, ...(receipt ?? [])];
    const { subject, messageId } = mail;
    const answer = await deps.mailer.send({
      to: mail.address,
      from: deps.site.mailFrom,
      subject,
      messageId,
      attachments,
      // One click, without a page (RFC 2369, RFC 8058).
      headers: off
        ? {
            'List-Unsubscribe': `<${off.url}>`,
            'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
          }
        : {},
      ...renderMail(deps.site.publicUrl, { ...content, subject, paragraphs }, off),
    });
    await become({ state: 'sent', sentAt: deps.clock.now(), answer: answer.slice(0, MOST_WORDS) });
  } catch (error) {
    const lastError = wordsOf(error);
    if (error instanceof MailRefused)
      return become({ state: 'refused', lastError, answer: lastError });
    if (mail.attempts >= MOST_ATTEMPTS) return become({ state: 'given-up', lastError });
    await become({ state: 'failed', lastError });
    throw error;
  }
};
