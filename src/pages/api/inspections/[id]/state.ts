import { stateRequest } from '@/contracts/inspection/acts';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { changeState } from '@/services/inspection/change-state';

export const POST = write(stateRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : changeState(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
