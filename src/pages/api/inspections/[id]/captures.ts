import { capturesRequest } from '@/contracts/inspection/captures';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { recordCaptures } from '@/services/inspection/capture/record-captures';

export const POST = write(capturesRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : recordCaptures(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
