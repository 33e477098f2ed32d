import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { planConsistency, planInclusion } from '@/domain/ledger/proof';
import type { Extension, LineProof } from '@/domain/ledger/verify/line-proof';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { findLatest, findOfSize, type StoredCheckpoint } from '../checkpoint/find-checkpoint';
import { readPlan } from '../nodes';

type Deps = Pick<Ports, 'db'>;

const fault = (pointer: string, detail: string): { ok: false; failure: Failure } => {
  const faults: readonly Fault[] = [{ pointer, detail }];
  return fail(invalid(faults));
};

const findHead = ({ db }: Deps, seriesId: string, size: number | undefined) =>
  size === undefined ? findLatest(db, seriesId) : findOfSize(db, seriesId, size);

/** The inclusion path of one line under a head that is at hand. */
export const proofUnder = async (
  { db }: Deps,
  seriesId: string,
  index: number,
  head: StoredCheckpoint,
): Promise<LineProof | undefined> => {
  const [row] = await db.execute<{ line: string }[]>(
    'select line from record.ledger_line where series_id = ? and index = ?',
    [seriesId, index],
  );
  if (row === undefined) return undefined;
  const path = await readPlan(db, seriesId, planInclusion(index, head.size));
  return { line: row.line, path: path.map(toHex), checkpoint: head.note };
};

/** A line, its path and the signed head of this size; the newest head when none is asked for. */
export const proveLine = async (
  deps: Deps,
  asked: { readonly seriesId: string; readonly index: number; readonly size?: number | undefined },
): Promise<Result<LineProof, Failure>> => {
  const { seriesId, index, size } = asked;
  const head = await findHead(deps, seriesId, size);
  if (head === undefined) return fail(absent());
  if (index >= head.size)
    return fault('/index', `The signed head covers lines 0 to ${head.size - 1}.`);
  const proof = await proofUnder(deps, seriesId, index, head);
  return proof === undefined ? fail(absent()) : ok(proof);
};

/** The path from the first `from` lines to the signed head of `to` lines, the newest unless asked. */
export const proveExtension = async (
  deps: Deps,
  asked: { readonly seriesId: string; readonly from: number; readonly to?: number | undefined },
): Promise<Result<Extension, Failure>> => {
  const { seriesId, from, to } = asked;
  const head = await findHead(deps, seriesId, to);
  if (head === undefined) return fail(absent());
  if (from < 1 || from > head.size)
    return fault('/from', `Give a number of lines from 1 to ${head.size}.`);
  const path = await readPlan(deps.db, seriesId, planConsistency(from, head.size));
  return ok({ path: path.map(toHex), checkpoint: head.note });
};
