import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read } from '@/http/api';
import { findSeriesKeys } from '@/services/ledger/proof/list-keys';
import { exactly, seriesAsked } from '../_series';

export const prerender = false;

export const GET = read(async ({ ports, params }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const keys = await findSeriesKeys(ports, series.value.id);
  return keys === undefined
    ? fail(absent())
    : ok(exactly(JSON.stringify(keys), 'application/json'));
});
