import type { APIRoute } from 'astro';
import { tagCode } from '@/domain/inspection/custody/tag';
import { problem } from '@/http/problem';
import { findPart } from '@/services/custody/find-part';

/** The part's tag: a label, or A4 with two of them. */
export const GET: APIRoute = async ({ params, locals, url, redirect }) => {
  const { ports, actor } = locals;
  if (actor === null) return redirect(`/sign-in?return=${encodeURIComponent(url.pathname)}`, 303);
  const found = await findPart(ports, actor, params['part'] ?? '');
  if (!found.ok) return problem(found.failure);
  const part = found.value;
  const bytes = await ports.tags.print({
    part,
    series: part.series,
    zone: part.zone,
    code: tagCode(`${ports.site.publicUrl}/barn/parts/${part.id}`, part),
    paper: url.searchParams.get('paper') === 'a4' ? 'a4' : 'label',
  });
  return new Response(Uint8Array.from(bytes), {
    headers: {
      'content-type': 'application/pdf',
      'content-disposition': `inline; filename="tag-${part.tag}.pdf"`,
      'cache-control': 'private, no-store',
    },
  });
};
