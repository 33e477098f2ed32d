import { expectPhotographRequest } from '@/contracts/inspection/photograph';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { expectPhotograph } from '@/services/inspection/photograph/expect-photograph';

export const POST = write(expectPhotographRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : expectPhotograph(ports, actor, { ...body, inspectionId: params['id'] ?? '' }),
);
