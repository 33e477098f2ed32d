import { type Actor, seriesWhere } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../ports';

/** The series of an inspection that the actor may decide in; nothing for any other id. */
export const findSeriesOfInspection = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  inspectionId: string,
): Promise<string | undefined> => {
  const series = seriesWhere(actor, 'verdict.read-drafts');
  if (series.length === 0 || !isId(inspectionId)) return undefined;
  const found = await deps.db.findOne(
    Inspection,
    { id: inspectionId, seriesId: { $in: [...series] } },
    { fields: ['seriesId'] },
  );
  return found?.seriesId;
};
