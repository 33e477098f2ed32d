import type { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../../ports';

export interface Happened {
  readonly at: string;
  readonly kind: string;
  /** Ledger line, counting from 0. */
  readonly line: number;
  readonly by: string;
  readonly change: string | null;
  readonly state: string | null;
  readonly reason: string | null;
  readonly place: string | null;
  readonly seals: string | null;
  readonly bag: string | null;
  readonly inspector: string | null;
  readonly inspectorBefore: string | null;
}

/** What happened to an inspection, from its lines in the ledger. */
export const readHistory = (
  deps: Pick<Ports, 'db'>,
  { seriesId, id }: Pick<Inspection, 'seriesId' | 'id'>,
): Promise<readonly Happened[]> =>
  deps.db.execute<Happened[]>(
    `select l.line::jsonb ->> 'at' as at, l.kind, l.index::int as line, p.name as by,
            c.content::jsonb ->> 'change' as change,
            c.content::jsonb ->> 'state' as state, c.content::jsonb ->> 'reason' as reason,
            c.content::jsonb ->> 'place' as place, c.content::jsonb ->> 'seals' as seals,
            c.content::jsonb ->> 'bag' as bag, n.name as inspector, b.name as "inspectorBefore"
     from record.ledger_line l
     join record.act a on a.id = l.act_id
     left join public.person p on p.id = a.actor_id
     left join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'change'
     left join public.person n on n.id::text = c.content::jsonb ->> 'inspector'
     left join public.person b on b.id::text = c.content::jsonb ->> 'inspectorBefore'
     where l.series_id = ? and l.line::jsonb #>> '{refs,inspection}' = ?
       and l.kind in ('inspection-opened', 'inspection-changed', 'report-signed', 'report-revised')
     order by l.index`,
    [seriesId, id],
  );
