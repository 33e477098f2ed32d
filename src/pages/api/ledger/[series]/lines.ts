import { readWholes } from '@/contracts/ledger/query';
import { ok } from '@/domain/result';
import { read } from '@/http/api';
import { listLines } from '@/services/ledger/proof/list-lines';
import { exactly, seriesAsked } from '../_series';

export const prerender = false;

export const GET = read(async ({ ports, params, context }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const asked = readWholes(context.url.searchParams, [
    { name: 'from', required: true },
    { name: 'count' },
  ]);
  if (!asked.ok) return asked;
  const { from = 0, count = 100 } = asked.value;
  const found = await listLines(ports, { seriesId: series.value.id, from, count });
  const lines = found.map(({ line, open }) => ({ line, open }));
  return ok(exactly(JSON.stringify({ lines }), 'application/json'));
});
