import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { findDecidableRow, type OpenedVersion, openRow } from './open-version';
import { getVersionDocument } from './version-document';

/** A file whose bytes were handed in before, with another engine. */
export interface SeenBefore {
  readonly fileId: string;
  readonly item: string;
  readonly carNumber: string;
  readonly reference: string;
}

export interface PaperworkToCheck extends OpenedVersion {
  /** The version before this one, of this paperwork or else of this engine in the series. */
  readonly previous: PaperworkDocument | undefined;
  readonly previousNumber: number | undefined;
  readonly seenBefore: readonly SeenBefore[];
}

const findSeenBefore = (
  em: EntityManager,
  seriesId: string,
  paperworkId: string,
  engineId: string,
): Promise<SeenBefore[]> =>
  em.execute<SeenBefore[]>(
    `select distinct f.id as "fileId", f.item, p.car_number as "carNumber", e.reference
     from public.file f
     join public.file g on g.series_id = f.series_id and g.sha256 = f.sha256 and g.id <> f.id
     join public.paperwork p on p.series_id = g.series_id and p.id = g.paperwork_id
     join public.engine e on e.id = p.engine_id
     where f.series_id = ? and f.paperwork_id = ? and f.removed_at is null
       and p.engine_id <> ? and p.versions > 0`,
    [seriesId, paperworkId, engineId],
  );

/** The version that waits, or one asked for by number, beside the one before it. */
export const openPaperworkToCheck = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  input: { readonly paperworkId: string; readonly number?: number | undefined },
): Promise<Result<PaperworkToCheck, Failure>> => {
  const row = await findDecidableRow(deps.db, actor, input.paperworkId);
  if (row === undefined) return fail(absent());
  const number = input.number ?? row.versions;
  const opened = await openRow(deps.db, row, number);
  if (opened === undefined) return fail(absent());
  const { seriesId, id, engineId } = row;
  const previousNumber = number > 1 ? number - 1 : undefined;
  return ok({
    ...opened,
    previousNumber,
    previous:
      previousNumber === undefined
        ? undefined
        : await getVersionDocument(deps.db, seriesId, id, previousNumber),
    seenBefore: await findSeenBefore(deps.db, seriesId, id, engineId),
  });
};
