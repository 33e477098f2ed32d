import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { problem } from '@/http/problem';
import { findAsked } from '../_asked';

/** The rules in force on paper. */
export const GET: APIRoute = async ({ locals, params, url }) => {
  const { ports } = locals;
  const asked = await findAsked(ports, params, url);
  if (asked?.book.standing === undefined || asked.unread) return problem(absent());
  const { book, base, query } = asked;
  const { rules, hash } = asked.book.standing;
  const bytes = await ports.rulebooks.print({
    rules,
    hash: toHex(hash),
    series: book.seriesName,
    zone: book.zone,
    at: book.at.toISOString(),
    url: new URL(`${base}${query}`, ports.site.publicUrl).href,
  });
  return new Response(Buffer.from(bytes), {
    headers: {
      'content-type': 'application/pdf',
      'content-disposition': `inline; filename="${book.classSlug}-${book.seasonSlug}.pdf"`,
    },
  });
};
