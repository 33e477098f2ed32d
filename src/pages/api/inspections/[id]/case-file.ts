import { fail, ok } from '@/domain/result';
import { read, signInFirst } from '@/http/api';
import { exportCaseFile } from '@/services/ledger/case-file/export-case-file';

export const prerender = false;

export const GET = read(async ({ ports, actor, params }) => {
  if (actor === null) return fail(signInFirst());
  const inspectionId = params['id'] ?? '';
  const file = await exportCaseFile(ports, actor, { inspectionId });
  if (!file.ok) return file;
  return ok(
    new Response(file.value, {
      headers: {
        'content-type': 'application/json; charset=utf-8',
        'content-disposition': `attachment; filename="case-file-${inspectionId}.json"`,
        'cache-control': 'private, no-store',
      },
    }),
  );
});
