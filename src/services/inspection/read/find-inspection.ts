import type { EntityManager } from '@mikro-orm/postgresql';
import { type Actor, type Permission, rolesIn, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Inspection } from '@/entities/event/inspection';
import type { Ports } from '../../ports';
import { getInspectionFile, type InspectionFile } from './inspection-file';

/** The inspection, if it is in a series where the actor holds the permission. */
export const findInspectionRow = (
  em: EntityManager,
  actor: Actor,
  permission: Permission,
  id: string,
): Promise<Inspection | null> => {
  const series = [...seriesWhere(actor, permission)];
  return series.length === 0 || !isId(id)
    ? Promise.resolve(null)
    : em.findOne(Inspection, { id, seriesId: { $in: series } });
};

/** Whether what this person records counts: the inspector named for it, or a chief inspector. */
export const worksOn = (
  actor: Actor,
  { seriesId, inspectorId }: Pick<Inspection, 'seriesId' | 'inspectorId'>,
): boolean =>
  rolesIn(actor, seriesId).includes('chief-inspector') ||
  (inspectorId === actor.personId && rolesIn(actor, seriesId).includes('inspector'));

/** One inspection's whole file for whoever may read inspections of its series. */
export const findInspection = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  id: string,
): Promise<Result<InspectionFile, Failure>> => {
  const row = await findInspectionRow(deps.db, actor, 'inspection.read', id);
  return row === null ? fail(absent()) : ok(await getInspectionFile(deps.db, row));
};
