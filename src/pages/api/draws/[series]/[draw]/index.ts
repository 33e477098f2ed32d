import { ok } from '@/domain/result';
import { read } from '@/http/api';
import { exactly } from '../../../ledger/_series';
import { drawAsked } from '../../_asked';

export const prerender = false;

export const GET = read(async ({ ports, params }) => {
  const draw = await drawAsked(ports, params);
  return draw.ok ? ok(exactly(JSON.stringify(draw.value), 'application/json')) : draw;
});
