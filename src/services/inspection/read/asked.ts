import type { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../../ports';

export interface Asked {
  /** Who picked the car. */
  readonly by: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  /** Checks without teardown that its car failed and that were not taken back. */
  readonly failed: readonly {
    readonly clause: string;
    readonly sentence: string;
    readonly by: string;
  }[];
}

/** Who asked for an inspection, when, and which checks its car failed at the event. */
export const readAsked = async (
  deps: Pick<Ports, 'db'>,
  inspection: Pick<Inspection, 'seriesId' | 'entryId' | 'pickedBy' | 'pickedAt'>,
): Promise<Asked> => {
  const [person] = await deps.db.execute<{ name: string }[]>(
    'select name from public.person where id = ?',
    [inspection.pickedBy],
  );
  const failed = await deps.db.execute<{ clause: string; sentence: string; by: string }[]>(
    `select clause, sentence, by from (
       select distinct on (k.clause) k.clause, k.sentence, k.state, p.name as by
       from record.event_check k join public.person p on p.id = k.taken_by
       where k.series_id = ? and k.entry_id = ?
       order by k.clause, k.received_at desc, k.id desc
     ) last where state = 'outside' order by clause`,
    [inspection.seriesId, inspection.entryId],
  );
  return { by: person?.name ?? 'an official', at: inspection.pickedAt.toISOString(), failed };
};
