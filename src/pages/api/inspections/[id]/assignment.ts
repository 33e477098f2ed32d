import { assignRequest } from '@/contracts/inspection/acts';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { assignInspector } from '@/services/inspection/assign-inspector';

export const POST = write(assignRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : assignInspector(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
