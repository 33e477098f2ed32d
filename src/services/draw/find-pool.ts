import type { EntityManager } from '@mikro-orm/postgresql';
import type { DrawCommitment } from '@/domain/draw/documents';
import { sha256, toHex } from '@/domain/ledger/bytes';
import { canonicalBytes } from '@/domain/ledger/canonical';
import type { DrawSubject } from './find-history';

export interface Pool {
  /** Every car entered in the class and not withdrawn, in the order of car numbers; nobody is left out by hand. */
  readonly pool: DrawCommitment['pool'];
  /** SHA-256 of the pool in canonical form. */
  readonly hash: string;
}

export const findPool = async (em: EntityManager, subject: DrawSubject): Promise<Pool> => {
  const rows = await em.execute<{ car: string }[]>(
    `select car_number as car from public.entry
     where series_id = ? and event_id = ? and class_id = ? and state <> 'withdrawn'
     order by coalesce(nullif(regexp_replace(car_number, '\\D', '', 'g'), ''), '0')::bigint,
              length(car_number), car_number collate "C"`,
    [subject.seriesId, subject.eventId, subject.classId],
  );
  const pool = rows.map(({ car }, i) => ({ number: String(i + 1), car }));
  return { pool, hash: toHex(sha256(canonicalBytes(pool))) };
};
