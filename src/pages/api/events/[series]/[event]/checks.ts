import { checkRequest } from '@/contracts/event/check';
import { absent } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read, signInFirst, write } from '@/http/api';
import { findChecks } from '@/services/event/check/find-checks';
import { recordCheck } from '@/services/event/check/record-check';

export const POST = write(checkRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : recordCheck(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        eventId: params['event'] ?? '',
      }),
);

export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const found = await findChecks(ports, actor, params['event'] ?? '');
  if (!found.ok) return found;
  const { shown } = found.value;
  return shown.seriesId === params['series'] ? ok(shown) : fail(absent());
});
