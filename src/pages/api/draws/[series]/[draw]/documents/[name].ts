import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read } from '@/http/api';
import { exactly } from '../../../../ledger/_series';
import { drawAsked } from '../../../_asked';

export const prerender = false;

export const GET = read(async ({ ports, params }) => {
  const draw = await drawAsked(ports, params);
  if (!draw.ok) return draw;
  const { announced, end } = draw.value;
  if (params['name'] === 'commitment.json')
    return ok(exactly(announced.document, 'application/json'));
  return end !== null && params['name'] === `${end.kind}.json`
    ? ok(exactly(end.document, 'application/json'))
    : fail(absent());
});
