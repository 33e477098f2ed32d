import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { isId } from '../../paperwork/own-paperwork';
import { isoOf, type PaperworkRow, readPaperwork } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';
import { type ErasableContent, listErasable } from './erase-lines';
import { type ErasedPaperwork, findErasure } from './find-erasure';

export interface Hold {
  readonly id: string;
  readonly kind: 'series' | 'paperwork';
  readonly reason: string;
  readonly since: string;
}

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
  const [row] = await readPaperwork(db, 'p.id = ? and p.versions > 0', [paperworkId]);
  if (row === undefined || !may(actor, 'series.administer', row.seriesId)) return fail(absent());
  const { seriesId } = row;
  const holds = await db.execute<Hold[]>(
    `select id, subject_kind as kind, reason, ${isoOf('since')} as since from public.hold
     where series_id = ? and lifted_at is null and subject_id in (?, ?) order by since`,
    [seriesId, seriesId, paperworkId],
  );
  const inspections = await db.execute<{ n: number }[]>(
    'select 1 as n from public.inspection where series_id = ? and paperwork_id = ? limit 1',
    [seriesId, paperworkId],
  );
  return ok({
    row,
    erased: await findErasure(deps, actor, paperworkId),
    contents: await listErasable(db, seriesId, { kind: 'paperwork', id: paperworkId }),
    holds,
    inspected: inspections.length > 0,
  });
};
