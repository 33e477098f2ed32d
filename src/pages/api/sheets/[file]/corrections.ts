import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { annotateSheet } from '@/services/paperwork/sheet/annotate/annotate-sheet';
import { bytesResponse } from '../../files/_bytes';

export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const made = await annotateSheet(ports, actor, { fileId: params['file'] ?? '' });
  return made.ok ? ok(bytesResponse(made.value, 'attachment')) : made;
});
