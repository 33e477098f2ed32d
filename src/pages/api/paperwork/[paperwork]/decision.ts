import { decideRequest } from '@/contracts/paperwork/paperwork';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';

export const POST = write(decideRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : decidePaperwork(ports, actor, { ...body, paperworkId: params['paperwork'] ?? '' }),
);
