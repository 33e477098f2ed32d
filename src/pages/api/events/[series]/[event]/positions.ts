import { positionsRequest } from '@/contracts/event/event';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { writePositions } from '@/services/event/write-positions';

export const POST = write(positionsRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : writePositions(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        eventId: params['event'] ?? '',
      }),
);
