import { readWholes } from '@/contracts/ledger/query';
import { ok } from '@/domain/result';
import { read } from '@/http/api';
import { proveLine } from '@/services/ledger/proof/prove-line';
import { exactly, seriesAsked } from '../_series';

export const prerender = false;

export const GET = read(async ({ ports, params, context }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const asked = readWholes(context.url.searchParams, [
    { name: 'index', required: true },
    { name: 'size' },
  ]);
  if (!asked.ok) return asked;
  const { index = 0, size } = asked.value;
  const proof = await proveLine(ports, { seriesId: series.value.id, index, size });
  return proof.ok ? ok(exactly(JSON.stringify(proof.value), 'application/json')) : proof;
});
