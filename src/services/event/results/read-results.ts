import type { EntityManager } from '@mikro-orm/postgresql';
import { fastestLap } from '@/domain/event/lap-time';

export interface ResultLine {
  readonly entryId: string;
  readonly carNumber: string;
  readonly position: number | null;
  readonly scratched: boolean;
  /** As it was written. */
  readonly fastestLap: string | undefined;
  readonly laps: number;
  readonly inspectionId: string | null;
  /** The latest notice on it. */
  readonly notice: string | null;
  readonly decision: 'breach' | 'no-breach' | null;
  /** In the notice's words; the program applies none of it. */
  readonly penalty: string;
  /** Picked, and not decided yet. */
  readonly held: boolean;
}

export interface Statement {
  readonly number: number;
  readonly kind: 'official' | 'taken-back';
  readonly at: string;
  readonly by: string;
  readonly hash: string;
  readonly exceptions: readonly { readonly car: string; readonly reason: string }[];
  readonly reason: string;
  readonly line: string | null;
}

export interface ClassResults {
  readonly classId: string;
  readonly className: string;
  readonly lines: readonly ResultLine[];
  /** Every statement made, the first one first. */
  readonly statements: readonly Statement[];
  readonly official: boolean;
}

interface Row extends Omit<ResultLine, 'fastestLap' | 'laps' | 'held'> {
  readonly classId: string;
  readonly className: string;
  readonly laps: readonly string[];
}

interface StatementRow extends Pick<Statement, 'number' | 'kind' | 'at' | 'by' | 'hash' | 'line'> {
  readonly classId: string;
  readonly document: string;
}

/** The results of an event by class, with what is held for inspection and how they were stated. */
export const readResults = async (
  em: EntityManager,
  { seriesId, eventId }: { readonly seriesId: string; readonly eventId: string },
): Promise<readonly ClassResults[]> => {
  const rows = await em.execute<Row[]>(
    `select e.id as "entryId", e.class_id as "classId", c.name as "className",
            e.car_number as "carNumber", e.position, e.state = 'withdrawn' as scratched, e.laps,
            i.id as "inspectionId", v.number as notice, v.decision, coalesce(v.penalty, '') as penalty
     from public.entry e
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     left join lateral (
       select number, decision, penalty from record.verdict v
       where v.series_id = i.series_id and v.inspection_id = i.id
       order by report_revision desc limit 1
     ) v on true
     where e.series_id = ? and e.event_id = ?
     order by c.name, e.position nulls last, length(e.car_number), e.car_number`,
    [seriesId, eventId],
  );
  const statements = await em.execute<StatementRow[]>(
    `select s.class_id as "classId", s.number, s.kind, s.document, encode(s.hash, 'hex') as hash,
            to_char(s.stated_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at,
            p.name as by, l.index as line
     from record.result_statement s join public.person p on p.id = s.stated_by
     left join record.ledger_line l on l.series_id = s.series_id and l.act_id = s.act_id
     where s.series_id = ? and s.event_id = ? order by s.number`,
    [seriesId, eventId],
  );
  const classes = [...new Map(rows.map((row) => [row.classId, row.className])).entries()];
  return classes.map(([classId, className]) => {
    const made = statements
      .filter((one) => one.classId === classId)
      .map(({ document, classId: _, ...one }): Statement => {
        const { exceptions = [], reason = '' } = JSON.parse(document) as Partial<Statement>;
        return { ...one, exceptions, reason };
      });
    return {
      classId,
      className,
      statements: made,
      official: made.at(-1)?.kind === 'official',
      lines: rows
        .filter((row) => row.classId === classId)
        .map(({ classId: _, className: __, laps, ...row }) => ({
          ...row,
          laps: laps.length,
          fastestLap: fastestLap(laps),
          held: row.inspectionId !== null && row.decision === null,
        })),
    };
  });
};
