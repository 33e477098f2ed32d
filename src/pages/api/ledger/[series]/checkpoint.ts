import { readWholes } from '@/contracts/ledger/query';
import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read } from '@/http/api';
import { findLatest, findOfSize } from '@/services/ledger/checkpoint/find-checkpoint';
import { exactly, seriesAsked } from '../_series';

export const prerender = false;

export const GET = read(async ({ ports, params, context }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const asked = readWholes(context.url.searchParams, [{ name: 'size' }]);
  if (!asked.ok) return asked;
  const { id } = series.value;
  const { size } = asked.value;
  const head =
    size === undefined ? await findLatest(ports.db, id) : await findOfSize(ports.db, id, size);
  return head === undefined ? fail(absent()) : ok(exactly(head.note, 'text/plain'));
});
