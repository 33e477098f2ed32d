import { publishRequest } from '@/contracts/rulebook/operations';
import { absent } from '@/domain/failure';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { publishBulletin } from '@/services/rulebook/bulletin/publish-bulletin';
import { findDraft } from '@/services/rulebook/draft/find-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';

export const POST = write(publishRequest, async ({ ports, actor, params, body }) => {
  if (actor === null) return fail(signInFirst());
  const draft = await findDraft(ports, actor, params['draft'] ?? '');
  if (draft === undefined) return fail(absent());
  const { act, version } = body;
  const shared = { act, version, seriesId: draft.seriesId, draftId: draft.id };
  return draft.kind === 'bulletin'
    ? publishBulletin(ports, actor, shared)
    : publishEdition(ports, actor, { ...shared, inForceAt: body.inForceAt ?? null });
});
