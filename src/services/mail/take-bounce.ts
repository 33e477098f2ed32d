import { LockMode } from '@mikro-orm/postgresql';
import { type Failure, failure } from '@/domain/failure';
import { readDeliveryReport } from '@/domain/mail/read-bounce';
import { fail, ok, type Result } from '@/domain/result';
import { Mail } from '@/entities/people/mail';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

export interface BounceTaken {
  /** Whether a message of ours is known by it as not delivered. */
  readonly noted: boolean;
}

/**
 * Takes a report of what became of a message. Only what names one of our Message-IDs and says that it
 * failed changes anything; the same report twice changes nothing more.
 */
export const takeBounce = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  input: { readonly message: string },
): Promise<Result<BounceTaken, Failure>> => {
  const report = readDeliveryReport(input.message);
  if (report === undefined) {
    const detail = 'This is no report of a message that was not delivered (RFC 3464).';
    return fail(failure('unsupported-file', detail));
  }
  const failed = report.recipients.find(({ action }) => action === 'failed');
  if (failed === undefined || report.messageIds.length === 0) return ok({ noted: false });
  const answer = [failed.status, failed.words].filter((part) => part !== '').join(' ');
  const { messageIds } = report;
  return performAct(
    deps,
    null,
    { id: deps.random.uuid(), kind: 'take-bounce', seriesId: null, input: { messageIds, answer } },
    async ({ em, at }) => {
      const mails = await em.find(
        Mail,
        { messageId: { $in: [...messageIds] }, state: { $in: ['sent', 'failed', 'to-send'] } },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      for (const mail of mails) Object.assign(mail, { state: 'bounced', answer, changedAt: at });
      return ok({ noted: mails.length > 0 });
    },
  );
};
