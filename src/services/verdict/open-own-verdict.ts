import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { findHex } from '@/domain/ledger/bytes';
import { fail, ok, type Result } from '@/domain/result';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import { type ReportView, readReport } from '@/domain/verdict/report-view';
import type { Ports } from '../ports';
import { getRules } from '../rulebook/find-rules';
import { verdictsOpenTo } from './verdicts-open-to';

export interface OwnVerdictListed {
  readonly number: string;
  readonly seriesId: string;
  readonly series: string;
  readonly notice: NoticeDocument;
  readonly final: boolean;
}

export interface OwnVerdict extends OwnVerdictListed {
  /** The whole signed report: what was found on this engine, the advisory findings too. */
  readonly report: ReportView;
  readonly rules: RulesInForce;
  readonly printed: boolean;
}

interface Row {
  readonly seriesId: string;
  readonly series: string;
  readonly notice: string;
  readonly document: string;
  readonly rules: string;
  readonly printed: boolean;
}

const readOwn = (deps: Pick<Ports, 'db'>, actor: Actor, number: string | null) => {
  const open = verdictsOpenTo(actor);
  return deps.db.execute<Row[]>(
    `select v.series_id as "seriesId", s.name as series, v.notice, r.document,
            encode(v.rules_hash, 'hex') as rules, n.verdict_id is not null as printed
     from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     join public.series s on s.id = v.series_id
     join record.report r on r.series_id = v.series_id and r.inspection_id = v.inspection_id
       and r.revision = v.report_revision
     left join record.notice_pdf n on n.series_id = v.series_id and n.verdict_id = v.id
     where ${open.sql} and (?::text is null or v.number = ?)
     order by v.published_at desc limit 200`,
    [...open.parameters, number, number],
  );
};

const listed = (row: Row, now: Date): OwnVerdictListed => {
  const notice = JSON.parse(row.notice) as NoticeDocument;
  const final = Date.parse(notice.provisionalUntil) < now.getTime();
  return { number: notice.number, seriesId: row.seriesId, series: row.series, notice, final };
};

/** The verdicts on the actor's own entries, in every series, the newest first. */
export const listOwnVerdicts = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly OwnVerdictListed[]> => {
  const now = deps.clock.now();
  return (await readOwn(deps, actor, null)).map((row) => listed(row, now));
};

/** A verdict on the actor's own entry with all that was found; absent to everybody else. */
export const openOwnVerdict = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: { readonly number: string; readonly series?: string },
): Promise<Result<OwnVerdict, Failure>> => {
  const rows = (await readOwn(deps, actor, input.number)).filter(
    (row) =>
      input.series === undefined ||
      (JSON.parse(row.notice) as NoticeDocument).series.slug === input.series,
  );
  const [row] = rows;
  if (row === undefined) return fail(absent());
  const report = readReport(row.document);
  if (!report.ok) throw new Error(report.failure.detail);
  return ok({
    ...listed(row, deps.clock.now()),
    report: report.value,
    rules: await getRules(deps.db, row.seriesId, findHex(row.rules, 32) ?? new Uint8Array()),
    printed: row.printed,
  });
};
