import { LockMode } from '@mikro-orm/core';
import type { EntityManager } from '@mikro-orm/postgresql';
import { RaceClass } from '@/entities/series/race-class';
import { Season } from '@/entities/series/season';
import type { Publication } from '../publication';

/**
 * The class, held until the act ends so that its publications are numbered one after the other,
 * with the next number of this kind; nothing if there is no such class.
 */
export const takeNumber = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
  kind: Publication['kind'],
): Promise<
  { readonly raceClass: RaceClass; readonly season: Season; readonly number: number } | undefined
> => {
  const raceClass = await em.findOne(
    RaceClass,
    { seriesId, id: classId },
    { lockMode: LockMode.PESSIMISTIC_WRITE },
  );
  if (raceClass === null) return undefined;
  const season = await em.findOneOrFail(Season, { seriesId, id: raceClass.seasonId });
  const [last] = await em.execute<{ last: number }[]>(
    `select coalesce(max(number), 0) as last from record.rule_publication
     where series_id = ? and class_id = ? and kind = ?`,
    [seriesId, classId, kind],
  );
  return { raceClass, season, number: (last?.last ?? 0) + 1 };
};
