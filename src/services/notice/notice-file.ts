import type { EntityManager } from '@mikro-orm/postgresql';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { LineProof } from '@/domain/ledger/verify/line-proof';
import { NOTICE_FILE_NAME, writeNoticeFile } from '@/domain/ledger/verify/notice-file';

/** The notice's line, and its open content as the ledger keeps it. */
export interface NoticeLine {
  readonly index: number;
  readonly line: string;
  /** Hexadecimal. */
  readonly salt: string;
}

/** The proof of a line under a signed head, and the series' key. */
export interface NoticeProof {
  readonly proof: LineProof;
  readonly key: string;
  /** Which signed head of the series it is, counted from 1. */
  readonly checkpoint: number;
}

export const findNoticeLine = async (
  em: EntityManager,
  seriesId: string,
  actId: string,
): Promise<NoticeLine | undefined> => {
  const [row] = await em.execute<{ index: string; line: string; salt: string }[]>(
    `select l.index, l.line, encode(c.salt, 'hex') as salt
     from record.ledger_line l
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'notice'
     where l.series_id = ? and l.act_id = ? and l.kind = 'verdict-published'`,
    [seriesId, actId],
  );
  return row && { index: Number(row.index), line: row.line, salt: row.salt };
};

/** What the PDF carries: the whole proof where there is one, else document, salt and line. */
export const noticeAttachment = (
  document: string,
  { line, salt }: NoticeLine,
  proven: NoticeProof | undefined,
): { readonly name: string; readonly text: string } =>
  proven === undefined
    ? {
        name: 'notice.json',
        text: canonicalJson({
          v: '1',
          type: 'tagwire/notice-unproven',
          document,
          role: 'notice',
          salt,
          line,
        }),
      }
    : {
        name: NOTICE_FILE_NAME,
        text: writeNoticeFile({
          document,
          role: 'notice',
          salt,
          proof: proven.proof,
          key: proven.key,
        }),
      };
