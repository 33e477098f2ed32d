import type { CaseFile } from '@/contracts/case-file/case-file';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { findInspectionRow } from '../../inspection/read/find-inspection';
import { actIdFor } from '../../notice/act-id';
import type { Ports } from '../../ports';
import { findLatest } from '../checkpoint/find-checkpoint';
import { findPublishedKey } from '../checkpoint/published-key';
import { proofUnder } from '../proof/prove-line';

type Deps = Pick<Ports, 'db'>;

interface Asked {
  readonly seriesId: string;
  readonly inspectionId: string;
}

/** Numbers of the lines on one inspection: states, reports, custody, verdicts and their reviews, PDFs. */
const findIndices = async ({ db }: Deps, { seriesId, inspectionId }: Asked) => {
  const own = await db.execute<{ index: string }[]>(
    `select index from record.ledger_line
     where series_id = ? and line::jsonb #>> '{refs,inspection}' = ?
       and kind in ('inspection-opened', 'inspection-changed', 'report-signed', 'report-revised')`,
    [seriesId, inspectionId],
  );
  const around = await db.execute<{ index: string }[]>(
    `select index from record.ledger_line
     where series_id = ? and line::jsonb #>> '{refs,inspection}' = ?
       and kind in ('part-tagged', 'custody-recorded', 'seal-recorded', 'gauge-checked', 'verdict-review')`,
    [seriesId, inspectionId],
  );
  const verdicts = await db.execute<{ id: string; act_id: string }[]>(
    'select id, act_id from record.verdict where series_id = ? and inspection_id = ?',
    [seriesId, inspectionId],
  );
  const acts = verdicts.flatMap(({ id, act_id }) => [act_id, actIdFor('render-notice', id)]);
  const decided = await db.execute<{ index: string }[]>(
    'select index from record.ledger_line where series_id = ? and act_id = any(?::uuid[])',
    [seriesId, `{${acts.join()}}`],
  );
  return [...own, ...around, ...decided].map(({ index }) => Number(index)).sort((a, b) => a - b);
};

const readContents = async ({ db }: Deps, seriesId: string, indices: readonly number[]) => {
  const rows = await db.execute<
    { line_index: string; role: string; salt: string; content: string | null }[]
  >(
    `select line_index, role, encode(salt, 'hex') as salt, content from record.ledger_content
     where series_id = ? and line_index = any(?::bigint[]) and salt is not null
     order by line_index, role`,
    [seriesId, `{${indices.join()}}`],
  );
  return (index: number) =>
    rows
      .filter((row) => Number(row.line_index) === index)
      .map(({ role, salt, content }) => ({ role, salt, document: content }));
};

const texts = async ({ db }: Deps, sql: string, { seriesId, inspectionId }: Asked) => {
  const rows = await db.execute<{ document: string }[]>(sql, [seriesId, inspectionId]);
  return rows.map(({ document }) => document);
};

/**
 * One inspection's whole file as canonical text: lines with proofs under the newest signed head,
 * what they commit to, all readings, the rules. For officials and the panel.
 */
export const exportCaseFile = async (
  deps: Deps,
  actor: Actor,
  input: { readonly inspectionId: string },
): Promise<Result<string, Failure>> => {
  const { inspectionId } = input;
  const inspection = await findInspectionRow(deps.db, actor, 'case-file.read', inspectionId);
  if (inspection === null) return fail(absent());
  const { seriesId } = inspection;
  const asked = { seriesId, inspectionId };
  const indices = await findIndices(deps, asked);
  const head = await findLatest(deps.db, seriesId);
  const key = head && (await findPublishedKey(deps.db, seriesId, head.size));
  if (head === undefined || key === undefined || indices.some((index) => index >= head.size)) {
    const words = 'The newest lines are not under a signed head yet. Ask again in a few seconds.';
    return fail(failure('unavailable', words));
  }
  const contentsOf = await readContents(deps, seriesId, indices);
  const lines: CaseFile['lines'] = [];
  for (const index of indices) {
    const proof = await proofUnder(deps, seriesId, index, head);
    if (proof !== undefined) lines.push({ proof, contents: contentsOf(index) });
  }
  const file: CaseFile = {
    v: '1',
    type: 'tagwire/case-file',
    series: seriesId,
    inspection: inspectionId,
    key: key.key,
    lines,
    batches: await texts(
      deps,
      'select document from record.capture_batch where series_id = ? and inspection_id = ? order by number',
      asked,
    ),
    rules: await texts(
      deps,
      `select r.document from record.rules r where r.series_id = ? and r.hash in
         (select p.rules_hash from record.report p
          where p.series_id = r.series_id and p.inspection_id = ?)
       order by r.hash`,
      asked,
    ),
  };
  return ok(canonicalJson(file));
};
