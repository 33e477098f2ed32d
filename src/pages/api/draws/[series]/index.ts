import { announceRequest } from '@/contracts/draw/draw';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { announceDraw } from '@/services/draw/announce-draw';

export const POST = write(announceRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : announceDraw(ports, actor, { ...body, seriesId: params['series'] ?? '' }),
);
