import { valuesRequest } from '@/contracts/draw/draw';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { publishDraw } from '@/services/draw/publish-draw';

export const POST = write(valuesRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : publishDraw(ports, actor, {
        ...body,
        seriesId: params['series'] ?? '',
        drawId: params['draw'] ?? '',
      }),
);
