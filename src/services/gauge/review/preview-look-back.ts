import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { GaugeRow } from '@/entities/event/gauge';
import { Series } from '@/entities/series/series';
import { type RegisteredGauge, registered } from '../../inspection/read/inspection-file';
import type { Ports } from '../../ports';
import { findLastGood, type LastGood } from '../last-good';
import { type LookBack, lookBack } from './look-back';

export interface LookBackPreview {
  readonly gauge: RegisteredGauge;
  readonly zone: string;
  readonly good: LastGood;
  readonly relied: LookBack;
}

/** What would be looked back upon if the gauge were found bad now; for who may say that it was. */
export const previewLookBack = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  { seriesId, gaugeId }: { readonly seriesId: string; readonly gaugeId: string },
): Promise<Result<LookBackPreview, Failure>> => {
  if (!may(actor, 'gauge.manage', seriesId) || !isId(gaugeId)) return fail(absent());
  const row = await deps.db.findOne(GaugeRow, { seriesId, id: gaugeId });
  if (row === null) return fail(absent());
  const until = deps.clock.now().toISOString();
  const good = await findLastGood(deps.db, row, until);
  return ok({
    gauge: registered(row),
    zone: (await deps.db.findOneOrFail(Series, { id: seriesId })).zone,
    good,
    relied: await lookBack(deps.db, seriesId, { gaugeId, after: good.at, until }),
  });
};
