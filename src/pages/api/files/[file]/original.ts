import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { openOriginal } from '@/services/file/open-file';
import { bytesResponse } from '../_bytes';

/** Always a download: an original is whatever somebody sent. */
export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const opened = await openOriginal(ports, actor, { fileId: params['file'] ?? '' });
  return opened.ok ? ok(bytesResponse(opened.value, 'attachment')) : opened;
});
