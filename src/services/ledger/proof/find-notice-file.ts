import { absent, type Failure, failure } from '@/domain/failure';
import { writeNoticeFile, writePdfFile } from '@/domain/ledger/verify/notice-file';
import { fail, ok, type Result } from '@/domain/result';
import { actIdFor } from '../../notice/act-id';
import type { Ports } from '../../ports';
import { findCovering } from '../checkpoint/find-checkpoint';
import { findPublishedKey } from '../checkpoint/published-key';
import { proofUnder } from './prove-line';

type Deps = Pick<Ports, 'db'>;

const notYet = (): { ok: false; failure: Failure } =>
  fail(
    failure('unavailable', 'No signed head covers this notice yet. Ask again in a few seconds.'),
  );

interface LineRow {
  readonly verdict: string;
  readonly index: string;
  readonly salt: string;
  readonly content: string | null;
}

const findLine = async ({ db }: Deps, seriesId: string, number: string) => {
  const [row] = await db.execute<LineRow[]>(
    `select v.id as verdict, l.index, encode(c.salt, 'hex') as salt, c.content
     from record.verdict v
     join record.ledger_line l
       on l.series_id = v.series_id and l.act_id = v.act_id and l.kind = 'verdict-published'
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'notice'
     where v.series_id = ? and v.number = ? and c.salt is not null`,
    [seriesId, number],
  );
  return row;
};

const findPdfLine = async ({ db }: Deps, seriesId: string, verdictId: string) => {
  const [row] = await db.execute<Omit<LineRow, 'verdict' | 'content'>[]>(
    `select l.index, encode(c.salt, 'hex') as salt from record.ledger_line l
     join record.ledger_content c
       on c.series_id = l.series_id and c.line_index = l.index and c.role = 'pdf'
     where l.series_id = ? and l.act_id = ? and l.kind = 'notice-pdf' and c.salt is not null`,
    [seriesId, actIdFor('render-notice', verdictId)],
  );
  return row;
};

/** The notice as a file: what its PDF carries, byte for byte, made anew. */
export const findNoticeFile = async (
  deps: Deps,
  asked: { readonly seriesId: string; readonly number: string },
): Promise<Result<string, Failure>> => {
  const { seriesId, number } = asked;
  const row = await findLine(deps, seriesId, number);
  if (row?.content == null) return fail(absent());
  const index = Number(row.index);
  const head = await findCovering(deps.db, seriesId, index);
  // The key that the head was signed with, though another may have followed it.
  const key = head && (await findPublishedKey(deps.db, seriesId, head.size));
  const proof = head && (await proofUnder(deps, seriesId, index, head));
  if (proof === undefined || key === undefined) return notYet();
  const { salt, content: document } = row;
  return ok(writeNoticeFile({ document, role: 'notice', salt, proof, key: key.key }));
};

/** The proof of the line that holds the hash of the notice's PDF. */
export const findPdfFile = async (
  deps: Deps,
  asked: { readonly seriesId: string; readonly number: string },
): Promise<Result<string, Failure>> => {
  const { seriesId, number } = asked;
  const notice = await findLine(deps, seriesId, number);
  if (notice === undefined) return fail(absent());
  const row = await findPdfLine(deps, seriesId, notice.verdict);
  const head = row && (await findCovering(deps.db, seriesId, Number(row.index)));
  const proof = row && head && (await proofUnder(deps, seriesId, Number(row.index), head));
  if (row === undefined || proof === undefined) return notYet();
  return ok(writePdfFile({ salt: row.salt, proof }));
};
