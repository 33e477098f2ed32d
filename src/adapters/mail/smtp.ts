import nodemailer from 'nodemailer';
import { type Mailer, MailRefused } from '@/services/ports';

const PATIENCE_MS = 10_000;

/** What nodemailer puts on errors that a server answered. */
interface SmtpError {
  readonly responseCode?: number;
  readonly response?: string;
  readonly command?: string;
}

/** A refusal of this person or message; that of sender or sign-in is our own matter, and mended some day. */
const isForGood = ({ responseCode = 0, command = '' }: SmtpError): boolean =>
  responseCode >= 500 && responseCode < 600 && /^(RCPT TO|DATA)/.test(command);

/** `bounces` is where reports of what was not delivered go; they go to the sender where it is not given. */
export const openMailer = (
  url: string,
  bounces?: string | undefined,
): Mailer & { close(): void } => {
  const transport = nodemailer.createTransport(url, {
    connectionTimeout: PATIENCE_MS,
    greetingTimeout: PATIENCE_MS,
    socketTimeout: PATIENCE_MS,
    disableFileAccess: true,
    disableUrlAccess: true,
  } as never);
  return {
    send: async ({ to, from, subject, text, html, messageId, headers, attachments }) => {
      try {
        const sent = await transport.sendMail({
          to,
          from,
          ...(bounces !== undefined && { envelope: { from: bounces, to } }),
          subject,
          text,
          html,
          messageId,
          // Nobody's absence is answered to a program (RFC 3834).
          headers: { 'Auto-Submitted': 'auto-generated', ...headers },
          attachments: attachments.map((file) => ({
            filename: file.name,
            contentType: file.type,
            content: Buffer.from(file.bytes),
          })),
        });
        return sent.response;
      } catch (error) {
        const answered = error as SmtpError;
        if (isForGood(answered)) throw new MailRefused(answered.response, { cause: error });
        throw error;
      }
    },
    close: () => transport.close(),
  };
};
