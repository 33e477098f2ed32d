import { readWholes } from '@/contracts/ledger/query';
import { ok } from '@/domain/result';
import { read } from '@/http/api';
import { proveExtension } from '@/services/ledger/proof/prove-line';
import { exactly, seriesAsked } from '../_series';

export const prerender = false;

export const GET = read(async ({ ports, params, context }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const asked = readWholes(context.url.searchParams, [
    { name: 'from', required: true },
    { name: 'to' },
  ]);
  if (!asked.ok) return asked;
  const { from = 0, to } = asked.value;
  const proof = await proveExtension(ports, { seriesId: series.value.id, from, to });
  return proof.ok ? ok(exactly(JSON.stringify(proof.value), 'application/json')) : proof;
});
