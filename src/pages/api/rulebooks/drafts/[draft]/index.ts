import { unreadDraftRequest } from '@/contracts/rulebook/drafts';
import { absent, failure } from '@/domain/failure';
import { fail, ok } from '@/domain/result';
import { read, signInFirst, write } from '@/http/api';
import { answer } from '@/http/json';
import { problem } from '@/http/problem';
import { type DraftFound, findDraft } from '@/services/rulebook/draft/find-draft';
import { saveDraft } from '@/services/rulebook/draft/save-draft';

const tag = (version: number): string => `"${version}"`;

const shown = ({ id, kind, title, version, updatedBy, updatedAt, content }: DraftFound) => ({
  id,
  kind,
  title,
  version,
  updatedBy,
  updatedAt,
  content,
});

export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const draft = await findDraft(ports, actor, params['draft'] ?? '');
  if (draft === undefined) return fail(absent());
  return ok(answer(shown(draft), 200, { etag: tag(draft.version) }));
});

export const PUT = write(unreadDraftRequest, async ({ ports, actor, params, body, context }) => {
  if (actor === null) return fail(signInFirst());
  const known = await findDraft(ports, actor, params['draft'] ?? '');
  if (known === undefined) return fail(absent());
  const match = /^"(\d{1,9})"$/.exec(context.request.headers.get('if-match') ?? '');
  if (match === null) {
    return fail(
      failure('invalid', 'Say in If-Match which version this grew from, such as "3".', [
        { pointer: '', detail: 'If-Match is missing.' },
      ]),
    );
  }
  const { act, kind, title, content } = body;
  const version = Number(match[1]);
  const { seriesId, id: draftId } = known;
  const saved = await saveDraft(ports, actor, {
    act,
    seriesId,
    draftId,
    kind,
    version,
    title,
    content,
  });
  if (saved.ok) return ok(answer(saved.value, 200, { etag: tag(saved.value.version) }));
  const newer = saved.failure.name === 'stale' ? await findDraft(ports, actor, draftId) : undefined;
  if (newer === undefined) return saved;
  const refused = problem(saved.failure);
  const told = { ...((await refused.json()) as object), newer: shown(newer) };
  return ok(
    new Response(JSON.stringify(told), {
      status: refused.status,
      headers: {
        'content-type': 'application/problem+json',
        'cache-control': 'no-store',
        etag: tag(newer.version),
      },
    }),
  );
});
