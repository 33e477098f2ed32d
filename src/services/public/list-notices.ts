import type { Decision, NoticeDocument } from '@/domain/verdict/notice/notice';
import type { Ports } from '../ports';

/** A row of the notice board. */
export interface NoticeListed {
  readonly number: string;
  readonly car: string;
  readonly className: string;
  readonly event: Pick<NoticeDocument['event'], 'number' | 'slug' | 'startsAt' | 'zone' | 'track'>;
  readonly decision: Decision;
  /** The breached ones, or those that were checked. */
  readonly clauses: readonly string[];
  readonly penalty: string;
  readonly publishedAt: string;
  readonly provisionalUntil: string;
  readonly final: boolean;
  /** A later notice on the same inspection, after its report was corrected. */
  readonly replacedBy: string | null;
}

export interface NoticePage {
  readonly notices: readonly NoticeListed[];
  readonly total: number;
  readonly page: number;
  readonly pages: number;
}

export const NOTICES_A_PAGE = 20;

interface Row {
  readonly notice: NoticeDocument;
  readonly replaced: string | null;
  readonly total: string;
}

const listed = ({ notice, replaced }: Row, now: Date): NoticeListed => ({
  number: notice.number,
  car: notice.car,
  className: notice.className,
  event: notice.event,
  decision: notice.decision,
  clauses: (notice.decision === 'breach' ? notice.breached : notice.checked).map(
    ({ number }) => number,
  ),
  penalty: notice.penalty?.words ?? '',
  publishedAt: notice.publishedAt,
  provisionalUntil: notice.provisionalUntil,
  final: Date.parse(notice.provisionalUntil) < now.getTime(),
  replacedBy: replaced,
});

/**
 * Published notices, the newest first. `find` is a notice's number, a car's, or a breached clause's;
 * a part of a notice's number will do. `event` narrows to one event by its address.
 */
export const listNotices = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  input: {
    readonly seriesId: string;
    readonly find?: string;
    readonly event?: string;
    readonly page?: number;
  },
): Promise<NoticePage> => {
  const find = (input.find ?? '').trim().slice(0, 40);
  const page = Math.max(1, Math.min(input.page ?? 1, 10_000));
  const part = `%${find.replaceAll(/[\\%_]/g, '\\$&')}%`;
  const rows = await deps.db.execute<Row[]>(
    `select v.notice::jsonb as notice, count(*) over () as total,
            (select l.number from record.verdict l
             where l.series_id = v.series_id and l.inspection_id = v.inspection_id
               and l.report_revision > v.report_revision
             order by l.report_revision desc limit 1) as replaced
     from record.verdict v
     where v.series_id = ?
       and (? = '' or v.number ilike ? or upper(v.notice::jsonb ->> 'car') = upper(?)
            or v.notice::jsonb -> 'breached' @> jsonb_build_array(jsonb_build_object('number', ?::text)))
       and (?::text is null or v.notice::jsonb #>> '{event,slug}' = ?)
     order by v.published_at desc, v.number desc limit ? offset ?`,
    [
      input.seriesId,
      find,
      part,
      find,
      find,
      input.event ?? null,
      input.event ?? null,
      NOTICES_A_PAGE,
      (page - 1) * NOTICES_A_PAGE,
    ],
  );
  const total = Number(rows[0]?.total ?? 0);
  const now = deps.clock.now();
  return {
    notices: rows.map((row) => listed(row, now)),
    total,
    page,
    pages: Math.max(1, Math.ceil(total / NOTICES_A_PAGE)),
  };
};
