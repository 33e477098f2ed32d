import { Mail } from '@/entities/people/mail';
import type { Ports } from '../ports';
import type { NewMail } from './queue-mail';
import { type FindHead, receiptParagraphs } from './receipt';
import { renderMail } from './render-mail';

const MOST_ATTACHMENT_BYTES = 8_000_000;

/** Sends one message. Thrown errors make the job come back later; a sent message is not sent again. */
export const sendMail = async (
  deps: Pick<Ports, 'db' | 'clock' | 'mailer' | 'objects' | 'site'>,
  { mailId }: { readonly mailId: string },
  findHead: FindHead = async () => undefined,
): Promise<void> => {
  const mail = await deps.db.findOneOrFail(Mail, { id: mailId });
  if (mail.state === 'sent') return;
  mail.attempts += 1;
  const content = mail.content as unknown as Pick<NewMail, 'paragraphs' | 'link' | 'receipt'> & {
    readonly attachments: NonNullable<NewMail['attachments']>;
  };
  try {
    const attachments = [];
    for (const { name, type, objectKey } of content.attachments) {
      const bytes = await deps.objects.read(objectKey, MOST_ATTACHMENT_BYTES);
      attachments.push({ name, type, bytes });
    }
    const receipt =
      content.receipt && (await receiptParagraphs(deps.db, content.receipt, findHead));
    const paragraphs = [...content.paragraphs, ...(receipt ?? [])];
    await deps.mailer.send({
      to: mail.address,
      from: deps.site.mailFrom,
      subject: mail.subject,
      messageId: mail.messageId,
      attachments,
      ...renderMail(deps.site.publicUrl, { ...content, paragraphs }),
    });
    mail.state = 'sent';
    mail.sentAt = deps.clock.now();
    mail.lastError = null;
  } catch (error) {
    mail.state = 'failed';
    mail.lastError = error instanceof Error ? error.message.slice(0, 500) : 'unknown';
    await deps.db.flush();
    throw error;
  }
  await deps.db.flush();
};
