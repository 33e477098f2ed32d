import type { EntityManager } from '@mikro-orm/postgresql';
import type { ErasureSubject } from './erase-lines';

/** Waits for whoever places or lifts a hold in the series, or erases there. Inside a transaction. */
export const lockHolds = async (em: EntityManager, seriesId: string): Promise<void> => {
  await em.execute('select 1 from public.series where id = ? for no key update', [seriesId]);
};

/** Why a subject's content must be kept, in words; nothing if it may be erased. */
export const findErasureObstacle = async (
  em: EntityManager,
  seriesId: string,
  subject: ErasureSubject,
): Promise<string | undefined> => {
  await lockHolds(em, seriesId);
  const [hold] = await em.execute<{ reason: string }[]>(
    `select reason from public.hold
     where series_id = ? and lifted_at is null and (subject_id in (?, ?)
       or exists (select from public.inspection i where i.series_id = ?
         and ((i.id = ? and subject_id = i.paperwork_id)
           or (i.event_id = ? and subject_id in (i.id, i.paperwork_id)))))
     order by since limit 1`,
    [seriesId, seriesId, subject.id, seriesId, subject.id, subject.id],
  );
  if (hold !== undefined)
    return `A hold stands: ${hold.reason} Nothing is erased before it is lifted.`;
  if (subject.kind !== 'paperwork') return undefined;
  const [inspection] = await em.execute<{ n: number }[]>(
    'select 1 as n from public.inspection where series_id = ? and paperwork_id = ? limit 1',
    [seriesId, subject.id],
  );
  return inspection && 'An inspection rests on this paperwork: it is kept with its report.';
};
