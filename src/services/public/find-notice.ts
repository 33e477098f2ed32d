import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { findNoticeLine } from '../notice/notice-file';
import type { Ports } from '../ports';

/** A published notice with what a stranger needs to check it. */
export interface PublishedNotice {
  readonly notice: NoticeDocument;
  /** The exact canonical text, its salt and the line that commits to it. */
  readonly document: string;
  readonly salt: string;
  readonly line: string;
  readonly index: number;
  readonly pdf: {
    readonly sha256: string;
    readonly bytes: number;
    readonly objectKey: string;
  } | null;
  readonly final: boolean;
  readonly replacedBy: string | null;
  readonly replaces: string | null;
  /** A later revision of its report that nobody has decided on yet. */
  readonly correctedAt: string | null;
  /** Only where an official made the review of this verdict public. */
  readonly review: {
    readonly state: 'open' | 'stands' | 'decide-again';
    readonly at: string;
  } | null;
}

interface Row {
  readonly act: string;
  readonly notice: string;
  readonly sha256: string | null;
  readonly bytes: string | null;
  readonly key: string | null;
  readonly later: string | null;
  readonly earlier: string | null;
  readonly corrected: string | null;
  readonly review: PublishedNotice['review'];
}

const iso = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

/** Nothing for a number that was not published in this series. */
export const findNotice = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  input: { readonly slug: string; readonly number: string },
): Promise<PublishedNotice | undefined> => {
  const [row] = await deps.db.execute<(Row & { seriesId: string })[]>(
    `select v.series_id as "seriesId", v.act_id as act, v.notice, encode(n.sha256, 'hex') as sha256,
            n.bytes, n.object_key as key,
            (select l.number from record.verdict l where l.series_id = v.series_id
               and l.inspection_id = v.inspection_id and l.report_revision > v.report_revision
             order by l.report_revision desc limit 1) as later,
            (select l.number from record.verdict l where l.series_id = v.series_id
               and l.inspection_id = v.inspection_id and l.report_revision < v.report_revision
             order by l.report_revision desc limit 1) as earlier,
            (select ${iso('max(r.signed_at)')} from record.report r where r.series_id = v.series_id
               and r.inspection_id = v.inspection_id and r.revision > v.report_revision
               and not exists (select from record.verdict l where l.series_id = r.series_id
                 and l.inspection_id = r.inspection_id and l.report_revision = r.revision)
            ) as corrected,
            (select jsonb_build_object('state', coalesce(d.kind, 'open'),
                      'at', ${iso('coalesce(d.acted_at, a.acted_at)')})
             from record.review_act a
             left join record.review_act d on d.series_id = a.series_id and d.review_id = a.review_id
               and d.kind in ('stands', 'decide-again')
             where a.series_id = v.series_id and a.verdict_id = v.id and a.kind = 'made-public'
             order by (d.id is not null), a.acted_at desc limit 1) as review
     from record.verdict v
     join public.series s on s.id = v.series_id
     left join record.notice_pdf n on n.series_id = v.series_id and n.verdict_id = v.id
     where s.slug = ? and v.number = ?`,
    [input.slug, input.number],
  );
  if (row === undefined) return undefined;
  const line = await findNoticeLine(deps.db, row.seriesId, row.act);
  if (line === undefined) throw new Error(`Notice ${input.number} has no ledger line.`);
  const notice = JSON.parse(row.notice) as NoticeDocument;
  const { sha256, bytes, key } = row;
  return {
    notice,
    document: row.notice,
    ...line,
    pdf:
      sha256 === null || bytes === null || key === null
        ? null
        : { sha256, bytes: Number(bytes), objectKey: key },
    final: Date.parse(notice.provisionalUntil) < deps.clock.now().getTime(),
    replacedBy: row.later,
    replaces: row.earlier,
    correctedAt: row.corrected,
    review: row.review,
  };
};
