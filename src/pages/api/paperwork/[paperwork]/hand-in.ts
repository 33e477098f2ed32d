import { handInRequest } from '@/contracts/paperwork/paperwork';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { handInPaperwork } from '@/services/paperwork/hand-in-paperwork';

export const POST = write(handInRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : handInPaperwork(ports, actor, { ...body, paperworkId: params['paperwork'] ?? '' }),
);
