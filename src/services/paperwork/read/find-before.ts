import type { EntityManager } from '@mikro-orm/postgresql';
import type { PaperworkDocument } from '@/domain/paperwork/document';
import type { PaperworkRow } from './read-row';
import { getVersionDocument } from './version-document';

export interface Before {
  readonly words: string;
  readonly document: PaperworkDocument;
}

interface Handed {
  readonly id: string;
  readonly number: number;
  readonly className: string;
  readonly season: string;
  readonly carNumber: string;
}

/**
 * What to compare with: version `number` of this paperwork, or where there is none the last that the same
 * competitor handed in of this engine in the series. Never another competitor's.
 */
export const findBefore = async (
  em: EntityManager,
  { seriesId, id, engineId, competitorId }: PaperworkRow,
  number: number,
): Promise<Before | undefined> => {
  const [found] = await em.execute<Handed[]>(
    `select p.id, v.number, c.name as "className", n.name as season, p.car_number as "carNumber"
     from record.paperwork_version v
     join public.paperwork p on p.series_id = v.series_id and p.id = v.paperwork_id
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     join public.season n on n.series_id = c.series_id and n.id = c.season_id
     where v.series_id = ? and v.document is not null and p.engine_id = ? and p.competitor_id = ?
       and ((p.id = ? and v.number = ?)
         or (? = 0 and p.id <> ? and v.received_at < coalesce(
           (select w.received_at from record.paperwork_version w
            where w.series_id = v.series_id and w.paperwork_id = ? and w.number = 1), 'infinity')))
     order by v.received_at desc limit 1`,
    [seriesId, engineId, competitorId, id, number, number, id, id],
  );
  if (found === undefined) return undefined;
  const document = await getVersionDocument(em, seriesId, found.id, found.number);
  const { className, season, carNumber } = found;
  const words =
    found.id === id
      ? `version ${found.number}`
      : `version ${found.number} of its paperwork for car ${carNumber}, ${className}, ${season}`;
  return { words, document };
};
