import { entriesRequest } from '@/contracts/event/event';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { enterCars } from '@/services/event/enter-cars';

export const POST = write(entriesRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : enterCars(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        eventId: params['event'] ?? '',
      }),
);
