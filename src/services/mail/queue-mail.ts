import type { EntityManager } from '@mikro-orm/postgresql';
import { Mail } from '@/entities/people/mail';
import type { JobPayloads, Ports } from '../ports';
import type { MailReceipt } from './receipt';

/** A message in our own few parts; text and HTML are made from it when it is sent. */
export interface NewMail {
  readonly seriesId: string | null;
  readonly personId: string | null;
  readonly address: string;
  readonly kind: string;
  readonly subject: string;
  readonly paragraphs: readonly string[];
  /** What to do next, in one sentence; where nothing is to be done, that is said. */
  readonly next?: string;
  /** Straight to where it is done. */
  readonly link: { readonly label: string; readonly path: string };
  /** Kept objects to attach. */
  readonly attachments?: readonly {
    readonly name: string;
    readonly type: string;
    readonly objectKey: string;
  }[];
  /** Adds line, hash and signed head of what the message confirms. */
  readonly receipt?: MailReceipt;
}

type Send = <Q extends keyof JobPayloads>(queue: Q, data: JobPayloads[Q]) => void;

/** Writes the message and the job that sends it, in the act's own transaction. */
export const queueMail = (
  deps: Pick<Ports, 'random' | 'site'>,
  em: EntityManager,
  act: { readonly send: Send; readonly at: Date },
  mail: NewMail,
): string => {
  const id = deps.random.uuid();
  const { seriesId, personId, address, kind, subject, paragraphs, link, attachments } = mail;
  const { receipt, next } = mail;
  em.persist(
    em.create(Mail, {
      id,
      seriesId,
      personId,
      address,
      kind,
      subject,
      // The same message keeps its Message-ID however often sending is tried.
      messageId: `<${id}@${new URL(deps.site.publicUrl).hostname}>`,
      content: {
        paragraphs,
        link,
        attachments: attachments ?? [],
        ...(next && { next }),
        ...(receipt && { receipt }),
      },
      state: 'to-send',
      attempts: 0,
      createdAt: act.at,
    }),
  );
  act.send('send-mail', { mailId: id });
  return id;
};
