import { voidRequest } from '@/contracts/draw/draw';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { voidDraw } from '@/services/draw/void-draw';

export const POST = write(voidRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : voidDraw(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        drawId: params['draw'] ?? '',
      }),
);
