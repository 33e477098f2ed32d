import type { APIContext } from 'astro';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { findLedgerSeries, type LedgerSeries } from '@/services/ledger/proof/find-series';
import type { Ports } from '@/services/ports';

/** The series that the address names by slug or id. */
export const seriesAsked = async (
  ports: Ports,
  params: APIContext['params'],
): Promise<Result<LedgerSeries, Failure>> => {
  const found = await findLedgerSeries(ports, params['series'] ?? '');
  return found === undefined ? fail(absent()) : ok(found);
};

/** Text as it is stored, open to pages of other sites: whoever checks need not be at ours. */
export const exactly = (text: string, type: string): Response =>
  new Response(text, {
    headers: {
      'content-type': `${type}; charset=utf-8`,
      'cache-control': 'no-cache',
      'access-control-allow-origin': '*',
    },
  });
