import type { APIRoute } from 'astro';
import { absent, failure } from '@/domain/failure';
import { problem } from '@/http/problem';
import { findNotice } from '@/services/public/find-notice';

const MOST_BYTES = 20_000_000;
const AWAY =
  'The print cannot be fetched just now. Try again in a minute; the notice itself can be read on its page.';

/** The printed notice, byte for byte as its hash was recorded. */
export const GET: APIRoute = async ({ params, locals, request }) => {
  const { ports } = locals;
  const { slug = '', number = '' } = params;
  const found = await findNotice(ports, { slug, number });
  if (found?.pdf === null || found === undefined) return problem(absent());
  const { sha256, objectKey } = found.pdf;
  const etag = `"${sha256}"`;
  const headers = {
    etag,
    'cache-control': 'public, max-age=31536000, immutable',
    'content-type': 'application/pdf',
    'content-disposition': `inline; filename="notice-${number}.pdf"`,
  };
  if (request.headers.get('if-none-match') === etag) {
    return new Response(null, { status: 304, headers });
  }
  try {
    const bytes = await ports.objects.read(objectKey, MOST_BYTES);
    return new Response(Uint8Array.from(bytes), { headers });
  } catch (error) {
    console.error(`notice ${number}: ${error instanceof Error ? error.message : String(error)}`);
    const answer = problem(failure('unavailable', AWAY));
    answer.headers.set('retry-after', '60');
    return answer;
  }
};
