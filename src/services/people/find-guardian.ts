import type { EntityManager } from '@mikro-orm/postgresql';
import { Guardianship } from '@/entities/people/guardianship';

/** Who signs for a competitor who is under age in a series; nothing for everybody else. */
export const findGuardian = async (
  em: EntityManager,
  seriesId: string,
  minorId: string,
): Promise<Guardianship | undefined> =>
  (await em.findOne(Guardianship, { seriesId, minorId, endedAt: null })) ?? undefined;
