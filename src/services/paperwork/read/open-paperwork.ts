import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { type CheckedPaperwork, checkRow, findOwnRow, noRules } from '../check-paperwork';
import { type PaperworkRow, readVersions, type VersionRow } from './read-row';

export interface OpenedPaperwork {
  readonly row: PaperworkRow;
  readonly checked: CheckedPaperwork;
  readonly versions: readonly VersionRow[];
}

/** The actor's own paperwork with everything its page shows. */
export const openPaperwork = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  paperworkId: string,
): Promise<Result<OpenedPaperwork, Failure>> => {
  const row = await findOwnRow(deps.db, actor, paperworkId);
  if (row === undefined) return fail(absent());
  const checked = await checkRow(deps.db, row, deps.clock.now());
  if (checked === undefined) return fail(noRules());
  const versions = await readVersions(deps.db, row.seriesId, row.id);
  return ok({ row, checked, versions });
};
