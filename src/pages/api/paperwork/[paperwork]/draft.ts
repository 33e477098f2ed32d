import { saveDraftRequest } from '@/contracts/paperwork/paperwork';
import { fail } from '@/domain/result';
import { read, signInFirst, write } from '@/http/api';
import { openDraft } from '@/services/paperwork/read/open-draft';
import { saveDraft } from '@/services/paperwork/save-draft';

export const GET = read(async ({ ports, actor, params }) =>
  actor === null ? fail(signInFirst()) : openDraft(ports, actor, params['paperwork'] ?? ''),
);

export const POST = write(saveDraftRequest, async ({ ports, actor, body, params }) =>
  actor === null
    ? fail(signInFirst())
    : saveDraft(ports, actor, { ...body, paperworkId: params['paperwork'] ?? '' }),
);
