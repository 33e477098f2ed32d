import type { EntityManager } from '@mikro-orm/postgresql';
import type { PaperworkRow } from './read-row';

/** A file whose bytes were handed in before, with another engine. */
export interface SeenBefore {
  readonly fileId: string;
  readonly name: string;
  /** Where it was handed in, too. */
  readonly paperworkId: string;
  readonly carNumber: string;
  readonly reference: string;
}

/**
 * Files of a version whose bytes some other engine's paperwork in the series holds as well, as far as
 * that was handed in: a draft is its owner's alone. For officials only; no competitor is told.
 */
export const findSeenBefore = (
  em: EntityManager,
  { seriesId, id, engineId }: Pick<PaperworkRow, 'seriesId' | 'id' | 'engineId'>,
  number: number,
): Promise<SeenBefore[]> =>
  em.execute<SeenBefore[]>(
    `select distinct f.id as "fileId", f.name, p.id as "paperworkId", p.car_number as "carNumber",
       e.reference
     from public.file f
     join record.paperwork_version v on v.series_id = f.series_id and v.paperwork_id = f.paperwork_id
       and v.number = ? and position(f.id::text in v.document) > 0
     join public.file g on g.series_id = f.series_id and g.sha256 = f.sha256 and g.id <> f.id
     join public.paperwork p on p.series_id = g.series_id and p.id = g.paperwork_id
     join public.engine e on e.id = p.engine_id
     where f.series_id = ? and f.paperwork_id = ? and p.engine_id <> ?
       and exists (
         select from record.paperwork_version w
         where w.series_id = g.series_id and w.paperwork_id = g.paperwork_id
           and position(g.id::text in w.document) > 0
       )
     order by f.id, p.id`,
    [number, seriesId, id, engineId],
  );
