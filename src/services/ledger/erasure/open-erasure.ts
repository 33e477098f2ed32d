import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { type PaperworkRow, readPaperwork } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';
import { type ErasableContent, listErasable } from './erase-lines';
import { type ErasedPaperwork, findErasure } from './find-erasure';
import { type Hold, listHolds } from './list-holds';

export interface ErasureDesk {
  readonly row: PaperworkRow;
  readonly erased: ErasedPaperwork | undefined;
  readonly contents: readonly ErasableContent[];
  /** Those that stand, on the paperwork or the whole series. */
  readonly holds: readonly Hold[];
  readonly inspected: boolean;
}

/** What an official sees before erasing a paperwork: what would go, and what stands against it. */
export const openErasure = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  paperworkId: string,
): Promise<Result<ErasureDesk, Failure>> => {
  if (!isId(paperworkId)) return fail(absent());
  const { db } = deps;
  const [row] = await readPaperwork(db, 'p.id = ?', [paperworkId]);
  if (row === undefined || !may(actor, 'series.administer', row.seriesId)) return fail(absent());
  const { seriesId } = row;
  const contents = await listErasable(db, seriesId, { kind: 'paperwork', id: paperworkId });
  if (row.versions === 0 && contents.length === 0) return fail(absent());
  const holds = await listHolds(db, seriesId, [paperworkId]);
  const inspections = await db.execute<{ n: number }[]>(
    'select 1 as n from public.inspection where series_id = ? and paperwork_id = ? limit 1',
    [seriesId, paperworkId],
  );
  return ok({
    row,
    erased: await findErasure(deps, actor, paperworkId),
    contents,
    holds,
    inspected: inspections.length > 0,
  });
};
