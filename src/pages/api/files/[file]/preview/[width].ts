import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { openPreview } from '@/services/file/open-file';
import { bytesResponse } from '../../_bytes';

export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const fileId = params['file'] ?? '';
  const opened = await openPreview(ports, actor, { fileId, width: Number(params['width']) });
  return opened.ok ? ok(bytesResponse(opened.value, 'inline')) : opened;
});
