import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { findSheetNow } from '@/services/inspection/read/sheet-now';

export const GET = read(async ({ ports, actor, params, context }) => {
  if (actor === null) return fail(signInFirst());
  const { searchParams } = context.url;
  const found = await findSheetNow(ports, actor, {
    inspectionId: params['id'] ?? '',
    bores: searchParams.getAll('second'),
    set: searchParams.get('set'),
  });
  return found.ok ? ok(found.value.now) : found;
});
