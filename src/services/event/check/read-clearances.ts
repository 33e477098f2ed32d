import type { EntityManager } from '@mikro-orm/postgresql';

export interface Clearance {
  readonly number: number;
  readonly signedAt: string;
  readonly signer: string;
  readonly hash: string;
  readonly line: string | null;
  /** Open content of its line: cars, clauses, outcome; no name and no value. */
  readonly cleared: string;
}

/** Every signed sheet of an event's checks, the first one first. */
export const readClearances = (
  em: EntityManager,
  { seriesId, eventId }: { readonly seriesId: string; readonly eventId: string },
): Promise<readonly Clearance[]> =>
  em.execute<Clearance[]>(
    `select c.number, p.name as signer, encode(c.hash, 'hex') as hash, l.index as line,
            to_char(c.signed_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as "signedAt",
            coalesce(o.content, '{}') as cleared
     from record.event_clearance c join public.person p on p.id = c.signed_by
     left join record.ledger_line l on l.series_id = c.series_id and l.act_id = c.act_id
     left join record.ledger_content o
       on o.series_id = l.series_id and o.line_index = l.index and o.role = 'cleared' and o.open
     where c.series_id = ? and c.event_id = ? order by c.number`,
    [seriesId, eventId],
  );
