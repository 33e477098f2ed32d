import { eventRequest } from '@/contracts/event/event';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { createEvent } from '@/services/event/create-event';

export const POST = write(eventRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : createEvent(ports, actor, { ...body, seriesId: params['series'] ?? '' }),
);
