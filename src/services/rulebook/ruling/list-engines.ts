import { type Actor, may } from '@/domain/access/permission';
import type { Ports } from '../../ports';

export interface EngineListed {
  readonly engineId: string;
  readonly name: string;
  readonly carNumber: string;
}

/** Engines that paperwork of a class declares, for those who may grant a waiver. */
export const listEngines = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  seriesId: string,
  classId: string,
): Promise<readonly EngineListed[]> =>
  may(actor, 'rulebook.publish', seriesId)
    ? deps.db.execute<EngineListed[]>(
        `select distinct on (e.id) e.id as "engineId", e.reference as name, p.car_number as "carNumber"
         from public.paperwork p join public.engine e on e.id = p.engine_id
         where p.series_id = ? and p.class_id = ? and p.state in ('handed-in', 'accepted', 'returned')
         order by e.id, p.car_number`,
        [seriesId, classId],
      )
    : [];
