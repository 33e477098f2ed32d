import type { Actor } from '@/domain/access/permission';
import { findHex } from '@/domain/ledger/bytes';
import { foundBefore, type LastFound } from '@/domain/paperwork/last-found';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { readReport } from '@/domain/verdict/report-view';
import type { Ports } from '../../ports';
import { getRules } from '../../rulebook/find-rules';
import { verdictsOpenTo } from '../../verdict/verdicts-open-to';

interface Row {
  readonly seriesId: string;
  readonly notice: string;
  readonly document: string;
  readonly rules: string;
}

/**
 * What the last teardown of an engine found, as far as its verdict is open to the actor; a published
 * verdict only, so that nobody reads here what the officials have not decided on yet.
 */
export const findLastFound = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  engineId: string,
): Promise<LastFound | undefined> => {
  const open = verdictsOpenTo(actor);
  const [row] = await deps.db.execute<Row[]>(
    `select v.series_id as "seriesId", v.notice, r.document, encode(v.rules_hash, 'hex') as rules
     from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     join public.inspection i on i.series_id = v.series_id and i.id = v.inspection_id
     join public.paperwork p on p.series_id = i.series_id and p.id = i.paperwork_id
     join record.report r on r.series_id = v.series_id and r.inspection_id = v.inspection_id
       and r.revision = v.report_revision
     where p.engine_id = ? and ${open.sql}
     order by v.published_at desc, v.number desc limit 1`,
    [engineId, ...open.parameters],
  );
  if (row === undefined) return undefined;
  const report = readReport(row.document);
  if (!report.ok) throw new Error(report.failure.detail);
  const { number, event } = JSON.parse(row.notice) as NoticeDocument;
  const rules = await getRules(deps.db, row.seriesId, findHex(row.rules, 32) ?? new Uint8Array());
  return {
    number,
    event: `event ${event.number}, ${event.track}`,
    signedAt: report.value.signedAt,
    found: foundBefore(report.value.findings, rules.clauses),
  };
};
