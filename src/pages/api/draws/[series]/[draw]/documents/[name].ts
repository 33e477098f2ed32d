import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read } from '@/http/api';
import { drawAsked, exactly } from '../../../_asked';

export const prerender = false;

export const GET = read(async ({ ports, params }) => {
  const draw = await drawAsked(ports, params);
  if (!draw.ok) return draw;
  const { announced, end } = draw.value;
  if (params['name'] === 'commitment.json') return ok(exactly(announced.document));
  return end !== null && params['name'] === `${end.kind}.json`
    ? ok(exactly(end.document))
    : fail(absent());
});
