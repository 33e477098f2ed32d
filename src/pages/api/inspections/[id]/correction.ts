import { reviseRequest } from '@/contracts/inspection/acts';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { reviseReport } from '@/services/inspection/report/revise-report';

export const POST = write(reviseRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : reviseReport(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
