import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';

export interface SeriesNamed {
  readonly id: string;
  readonly slug: string;
  readonly name: string;
}

/** Every series of this installation; their notice boards are public. */
export const listSeries = async (deps: Pick<Ports, 'db'>): Promise<readonly SeriesNamed[]> => {
  const all = await deps.db.find(Series, {}, { orderBy: { name: 'asc' } });
  return all.map(({ id, slug, name }) => ({ id, slug, name }));
};
