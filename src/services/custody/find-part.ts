import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../ports';
import { type PartKept, readPart } from './read-parts';

/** One held part's whole history, for whoever may read inspections of its series. */
export const findPart = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  id: string,
): Promise<Result<PartKept, Failure>> => {
  if (!isId(id)) return fail(absent());
  const part = await readPart(deps.db, seriesWhere(actor, 'inspection.read'), id);
  return part === undefined ? fail(absent()) : ok(part);
};
