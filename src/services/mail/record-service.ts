import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { didNotReach } from '@/domain/mail/mail-state';
import { fail, ok, type Result } from '@/domain/result';
import { Mail } from '@/entities/people/mail';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

export interface Service {
  readonly act: string;
  readonly seriesId: string;
  readonly mailId: string;
  /** `handed over in bay 2, before a witness` */
  readonly how: string;
  /** ISO 8601 instant. */
  readonly servedAt: string;
}

const MOST_WORDS = 500;

const faultsOf = ({ how, servedAt }: Service, at: Date) => {
  const faults = [];
  if (how.trim() === '')
    faults.push({ pointer: '/how', detail: 'Write how the person was told instead.' });
  if (how.length > MOST_WORDS)
    faults.push({ pointer: '/how', detail: `At most ${MOST_WORDS} characters.` });
  const instant = Date.parse(servedAt);
  if (Number.isNaN(instant))
    faults.push({ pointer: '/servedAt', detail: 'Give day and time when the person was told.' });
  else if (instant > at.getTime() + 60_000)
    faults.push({ pointer: '/servedAt', detail: 'This time is still to come.' });
  return faults;
};

/**
 * Records how somebody was served whom a message did not reach. It is kept in the record, with a
 * ledger line: a clock that starts with being told may hang on it.
 */
export const recordService = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: Service,
): Promise<Result<{ readonly serviceId: string }, Failure>> => {
  const { act: id, seriesId, mailId, servedAt } = input;
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  const how = input.how.trim();
  const faults = faultsOf(input, deps.clock.now());
  if (faults.length > 0) return fail(invalid(faults));
  return performAct(
    deps,
    actor,
    { id, kind: 'record-service', seriesId, input: { mailId, how, servedAt } },
    async ({ em, append, line }) => {
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const mail = await em.findOne(Mail, { id: mailId, seriesId }, lock);
      if (mail === null) return fail(absent());
      if (!didNotReach(mail.state))
        return fail(failure('not-in-this-state', 'This message reached, or is still on its way.'));
      const serviceId = deps.random.uuid();
      append('served_otherwise', [
        {
          series_id: seriesId,
          id: serviceId,
          mail_id: mailId,
          how,
          served_at: servedAt,
          recorded_by: actor.personId,
        },
      ]);
      const document = {
        document: 'tagwire/served-otherwise',
        version: '1',
        message: mail.messageId,
        kind: mail.kind,
        how,
        servedAt: new Date(servedAt).toISOString(),
      };
      line({
        seriesId,
        kind: 'served-otherwise',
        contents: { service: { text: canonicalJson(document), open: false } },
        refs: { mail: mailId },
      });
      return ok({ serviceId });
    },
  );
};
