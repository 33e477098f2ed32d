import { picksRequest } from '@/contracts/event/event';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { pickCars } from '@/services/event/pick-cars';

export const POST = write(picksRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : pickCars(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        eventId: params['event'] ?? '',
      }),
);
