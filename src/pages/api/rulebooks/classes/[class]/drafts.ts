import { openDraftRequest } from '@/contracts/rulebook/operations';
import { absent } from '@/domain/failure';
import { fail } from '@/domain/result';
import { signInFirst, write } from '@/http/api';
import { openBulletin } from '@/services/rulebook/draft/open-bulletin';
import { findWrittenClass } from '@/services/rulebook/find-rulebook';
import { openDraft } from '@/services/rulebook/open-draft';

export const POST = write(openDraftRequest, async ({ ports, actor, params, body }) => {
  if (actor === null) return fail(signInFirst());
  const named = await findWrittenClass(ports, actor, params['class'] ?? '');
  if (named === undefined) return fail(absent());
  const { seriesId, classId } = named;
  const shared = { act: body.act, id: body.id, seriesId, classId };
  return body.kind === 'bulletin'
    ? openBulletin(ports, actor, { ...shared, content: body.content })
    : openDraft(ports, actor, { ...shared, title: body.title, content: body.content });
});
