import { saveDraftRequest } from '@/contracts/paperwork/paperwork';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { saveDraft } from '@/services/paperwork/save-draft';

export const POST = write(saveDraftRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : saveDraft(ports, actor, { ...body, paperworkId: params['paperwork'] ?? '' }),
);
