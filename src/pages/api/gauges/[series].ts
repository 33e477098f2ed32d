import { gaugeRequest } from '@/contracts/gauge/gauge';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { saveGauge } from '@/services/gauge/save-gauge';

export const POST = write(gaugeRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : saveGauge(ports, actor, { ...body, seriesId: params['series'] ?? '' }),
);
