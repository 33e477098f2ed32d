import { type Actor, seriesWhere } from '@/domain/access/permission';
import { RaceClass } from '@/entities/series/race-class';
import { Season } from '@/entities/series/season';
import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';

export interface AdministeredSeries {
  readonly id: string;
  readonly slug: string;
  readonly name: string;
  readonly zone: string;
  readonly seasons: readonly {
    readonly id: string;
    readonly slug: string;
    readonly name: string;
    /** Days, `2026-03-01`. */
    readonly startsOn: string;
    readonly endsOn: string;
    readonly classes: readonly {
      readonly id: string;
      readonly slug: string;
      readonly name: string;
      readonly swapDueDays: number;
    }[];
  }[];
}

/** The series that this person runs, with their seasons (newest first) and classes. */
export const findAdministered = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly AdministeredSeries[]> => {
  const ids = seriesWhere(actor, 'series.administer');
  if (ids.length === 0) return [];
  const within = { $in: [...ids] };
  const all = await deps.db.find(Series, { id: within }, { orderBy: { name: 'asc' } });
  const seasons = await deps.db.find(
    Season,
    { seriesId: within },
    { orderBy: { startsOn: 'desc' } },
  );
  const classes = await deps.db.find(RaceClass, { seriesId: within }, { orderBy: { name: 'asc' } });
  return all.map(({ id, slug, name, zone }) => ({
    id,
    slug,
    name,
    zone,
    seasons: seasons
      .filter((season) => season.seriesId === id)
      .map((season) => ({
        id: season.id,
        slug: season.slug,
        name: season.name,
        startsOn: season.startsOn,
        endsOn: season.endsOn,
        classes: classes
          .filter((one) => one.seasonId === season.id)
          .map(({ id, slug, name, swapDueDays }) => ({ id, slug, name, swapDueDays })),
      })),
  }));
};
