import { saveDraftRequest } from '@/contracts/verdict/decision';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { saveVerdictDraft } from '@/services/verdict/save-verdict-draft';

export const POST = write(saveDraftRequest, async ({ ports, actor, params, body }) =>
  actor === null
    ? fail(signInFirst())
    : saveVerdictDraft(ports, actor, { ...body, seriesId: params['series'] ?? '' }),
);
