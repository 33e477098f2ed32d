import { publishRequest } from '@/contracts/verdict/decision';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { publishVerdict } from '@/services/verdict/publish-verdict';

export const POST = write(publishRequest, async ({ ports, actor, params, body }) =>
  actor === null
    ? fail(signInFirst())
    : publishVerdict(ports, actor, { ...body, seriesId: params['series'] ?? '' }),
);
