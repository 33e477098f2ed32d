import type { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../ports';
import { interestsIn } from './interest';

export interface InspectorOffered {
  readonly id: string;
  readonly name: string;
  /** Why this person may not inspect this car; nothing when they may. */
  readonly interest?: string | undefined;
  /** Other inspections that they have open. */
  readonly busyWith: number;
}

/** The inspectors of the series for one inspection: who is free, and who has an interest. */
export const listInspectors = async (
  deps: Pick<Ports, 'db'>,
  inspection: Pick<Inspection, 'seriesId' | 'id'>,
): Promise<readonly InspectorOffered[]> => {
  const people = await deps.db.execute<{ id: string; name: string; busy: number }[]>(
    `select p.id, p.name,
            (select count(*)::int from public.inspection i
             where i.series_id = ? and i.inspector_id = p.id and i.id <> ?
               and i.state in ('open', 'held-hot')) as busy
     from public.person p
     where exists (select from public.membership m where m.person_id = p.id and m.series_id = ?
                   and m.ended_at is null and m.role in ('inspector', 'chief-inspector'))
     order by p.name`,
    [inspection.seriesId, inspection.id, inspection.seriesId],
  );
  const interests = await interestsIn(deps.db, inspection);
  return people
    .map(({ id, name, busy }) => ({ id, name, busyWith: busy, interest: interests.get(id) }))
    .sort((a, b) => Number(a.interest !== undefined) - Number(b.interest !== undefined));
};
