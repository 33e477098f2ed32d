import type { EntityManager } from '@mikro-orm/postgresql';
import { isoOf } from '../../paperwork/read/read-row';

export interface Hold {
  readonly id: string;
  readonly kind: 'series' | 'paperwork' | 'inspection';
  readonly reason: string;
  /** ISO 8601 in UTC. */
  readonly since: string;
}

/** The holds that stand on the series or on one of these subjects of it, the oldest first. */
export const listHolds = (
  em: EntityManager,
  seriesId: string,
  subjects: readonly string[],
): Promise<Hold[]> =>
  em.execute<Hold[]>(
    `select id, subject_kind as kind, reason, ${isoOf('since')} as since from public.hold
     where series_id = ? and lifted_at is null and subject_id = any(?::uuid[]) order by since`,
    [seriesId, `{${[seriesId, ...subjects].join()}}`],
  );
