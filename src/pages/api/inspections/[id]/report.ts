import { signRequest } from '@/contracts/inspection/acts';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { signReport } from '@/services/inspection/report/sign-report';

export const POST = write(signRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : signReport(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
