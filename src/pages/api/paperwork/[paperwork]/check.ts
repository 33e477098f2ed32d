import { fail } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { checkPaperwork } from '@/services/paperwork/check-paperwork';

export const GET = read(async ({ ports, actor, params }) =>
  actor === null
    ? fail(signInFirst())
    : checkPaperwork(ports, actor, { paperworkId: params['paperwork'] ?? '' }),
);
