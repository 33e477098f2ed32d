import type { APIContext } from 'astro';
import type { PublicDrawAnswer } from '@/contracts/draw/draw';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { findPublicDraw } from '@/services/draw/find-public-draw';
import { findLedgerSeries } from '@/services/ledger/proof/find-series';
import type { Ports } from '@/services/ports';

/** The draw that the address names: the series by slug or id, the draw by id. */
export const drawAsked = async (
  ports: Ports,
  params: APIContext['params'],
): Promise<Result<PublicDrawAnswer, Failure>> => {
  const series = await findLedgerSeries(ports, params['series'] ?? '');
  const drawId = params['draw'] ?? '';
  const found = series && (await findPublicDraw(ports, { seriesId: series.id, drawId }));
  return found === undefined ? fail(absent()) : ok(found);
};
