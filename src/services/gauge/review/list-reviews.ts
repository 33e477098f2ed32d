import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../../ports';
import { type Review, readReviews } from './read-reviews';

/** Reviews in every series where the actor decides, open ones first. */
export const listReviews = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<Result<readonly Review[], Failure>> => {
  const series = seriesWhere(actor, 'verdict.decide');
  if (series.length === 0) return fail(absent());
  const marks = series.map(() => '?').join(', ');
  return ok(await readReviews(deps.db, `o.series_id in (${marks})`, series));
};
