import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { didNotReach } from '@/domain/mail/mail-state';
import { fail, ok, type Result } from '@/domain/result';
import { Mail } from '@/entities/people/mail';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Sends a message once more that did not reach: to the address that the person has by now. */
export const sendAgain = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: { readonly act: string; readonly seriesId: string; readonly mailId: string },
): Promise<Result<{ readonly address: string }, Failure>> => {
  const { act: id, seriesId, mailId } = input;
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id, kind: 'send-mail-again', seriesId, input: { mailId } },
    async ({ em, at, send }) => {
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const mail = await em.findOne(Mail, { id: mailId, seriesId }, lock);
      if (mail === null) return fail(absent());
      if (!didNotReach(mail.state))
        return fail(failure('not-in-this-state', 'This message reached, or is still on its way.'));
      const [person] = await em.execute<{ email: string }[]>(
        'select email from public.person where id = ?',
        [mail.personId],
      );
      const address = person?.email ?? mail.address;
      Object.assign(mail, { address, state: 'to-send', attempts: 0, changedAt: at });
      send('send-mail', { mailId });
      return ok({ address });
    },
  );
};
