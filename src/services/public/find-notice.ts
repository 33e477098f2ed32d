import type { NoticeDocument } from '@/domain/verdict/notice';
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
}

interface Row {
  readonly act: string;
  readonly notice: string;
  readonly sha256: string | null;
  readonly bytes: string | null;
  readonly key: string | null;
  readonly later: string | null;
  readonly earlier: string | null;
}

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
             order by l.report_revision desc limit 1) as earlier
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
  };
};
