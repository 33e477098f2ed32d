import { ok } from '@/domain/result';
import { read } from '@/http/api';
import { findPdfFile } from '@/services/ledger/proof/find-notice-file';
import { exactly, seriesAsked } from '../../../_series';

export const prerender = false;

export const GET = read(async ({ ports, params }) => {
  const series = await seriesAsked(ports, params);
  if (!series.ok) return series;
  const number = params['number'] ?? '';
  const file = await findPdfFile(ports, { seriesId: series.value.id, number });
  return file.ok ? ok(exactly(file.value, 'application/json')) : file;
});
