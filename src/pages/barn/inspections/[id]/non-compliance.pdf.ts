import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { problem } from '@/http/problem';
import { findSignedNonCompliance } from '@/services/inspection/report/find-non-compliance';

/** The report of non-compliance, made from the signed report each time it is asked for. */
export const GET: APIRoute = async ({ params, locals, url, redirect }) => {
  const { ports, actor } = locals;
  if (actor === null) return redirect(`/sign-in?return=${encodeURIComponent(url.pathname)}`, 303);
  const id = params['id'] ?? '';
  const found = await findSignedNonCompliance(ports, actor, id);
  if (!found.ok) return problem(found.failure);
  const { sheet, carNumber } = found.value;
  if (sheet === null) return problem(absent());
  const bytes = await ports.nonCompliances.print({
    sheet,
    url: `${ports.site.publicUrl}/barn/inspections/${id}/non-compliance`,
  });
  return new Response(Uint8Array.from(bytes), {
    headers: {
      'content-type': 'application/pdf',
      'content-disposition': `inline; filename="non-compliance-${carNumber}-${sheet.revision}.pdf"`,
      'cache-control': 'private, no-store',
    },
  });
};
