import { pickDrawnRequest } from '@/contracts/draw/draw';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { pickDrawn } from '@/services/draw/pick-drawn';

export const POST = write(pickDrawnRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : pickDrawn(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        drawId: params['draw'] ?? '',
      }),
);
