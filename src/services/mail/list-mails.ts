import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import type { ListedMail } from '@/domain/mail/listed-mail';
import { didNotReach, type MailState } from '@/domain/mail/mail-state';
import { isLegalNotice, mailKindWords } from '@/domain/mail/mail-topics';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../ports';

export interface MailList {
  readonly mails: readonly ListedMail[];
  readonly counts: Readonly<Partial<Record<MailState, number>>>;
}

type Row = Omit<ListedMail, 'kind' | 'mustBeServed' | 'served'> & {
  readonly name: string;
  readonly how: string | null;
  readonly servedAt: string;
  readonly servedBy: string;
};

const MOST = 200;

/** What a series sent to whom, newest first, or only what did not reach. */
export const listMails = async (
  { db }: Pick<Ports, 'db'>,
  actor: Actor,
  { seriesId, troubled }: { readonly seriesId: string; readonly troubled: boolean },
): Promise<Result<MailList, Failure>> => {
  if (!may(actor, 'series.administer', seriesId)) return fail(absent());
  const counted = await db.execute<{ state: MailState; n: string }[]>(
    'select state, count(*) as n from public.mail where series_id = ? group by state',
    [seriesId],
  );
  const rows = await db.execute<Row[]>(
    `select m.id, m.address, p.name as person, m.kind as name, m.subject, m.state, m.attempts,
       to_char(m.created_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as "createdAt",
       to_char(m.changed_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as "changedAt",
       coalesce(m.answer, m.last_error, '') as answer,
       s.how, to_char(s.served_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as "servedAt",
       b.name as "servedBy"
     from public.mail m
     left join public.person p on p.id = m.person_id
     left join lateral (
       select * from record.served_otherwise o
       where o.series_id = m.series_id and o.mail_id = m.id order by o.received_at limit 1
     ) s on true
     left join public.person b on b.id = s.recorded_by
     where m.series_id = ? and (? = false or m.state in ('failed', 'refused', 'given-up', 'bounced'))
     order by m.created_at desc, m.id limit ${MOST}`,
    [seriesId, troubled],
  );
  return ok({
    counts: Object.fromEntries(counted.map(({ state, n }) => [state, Number(n)])),
    mails: rows.map(({ name, how, servedAt, servedBy, ...row }) => ({
      ...row,
      kind: mailKindWords(name),
      mustBeServed: didNotReach(row.state) && isLegalNotice(name) && how === null,
      served: how === null ? null : { how, at: servedAt, by: servedBy },
    })),
  });
};
