import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { annotateSheet } from '@/services/paperwork/sheet/annotate/annotate-sheet';
import { bytesResponse } from '../_bytes';

/** `?subject=lifter-sheet`: the sheet's subject in the rulebook. */
export const GET = read(async ({ ports, actor, params, context }) => {
  if (actor === null) return fail(signInFirst());
  const subject = context.url.searchParams.get('subject') ?? '';
  const made = await annotateSheet(ports, actor, { fileId: params['file'] ?? '', subject });
  return made.ok ? ok(bytesResponse(made.value, 'attachment')) : made;
});
