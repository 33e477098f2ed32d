import nodemailer from 'nodemailer';
import type { Mailer } from '@/services/ports';

const PATIENCE_MS = 10_000;

export const openMailer = (url: string): Mailer & { close(): void } => {
  const transport = nodemailer.createTransport(url, {
    connectionTimeout: PATIENCE_MS,
    greetingTimeout: PATIENCE_MS,
    socketTimeout: PATIENCE_MS,
    disableFileAccess: true,
    disableUrlAccess: true,
  } as never);
  return {
    send: async (mail) => {
      await transport.sendMail({
        to: mail.to,
        from: mail.from,
        subject: mail.subject,
        text: mail.text,
        html: mail.html,
        messageId: mail.messageId,
        attachments: mail.attachments.map((file) => ({
          filename: file.name,
          contentType: file.type,
          content: Buffer.from(file.bytes),
        })),
      });
    },
    close: () => transport.close(),
  };
};
