import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { alreadyHas, notModified } from '@/http/kept-pages';
import { problem } from '@/http/problem';
import { printRulebook } from '@/services/rulebook/public/print-rulebook';
import { findAsked, lastingQuery } from '../_asked';

/** The rules in force on paper, with their hash and the lasting address of these very rules. */
export const GET: APIRoute = async ({ locals, params, url, request }) => {
  const { ports } = locals;
  const asked = await findAsked(ports, params, url);
  if (asked?.book.standing === undefined || asked.unread) return problem(absent());
  const { book, base } = asked;
  const { rules, hash, since } = asked.book.standing;
  const printed = printRulebook(ports, {
    rules,
    hash: toHex(hash),
    series: book.seriesName,
    zone: book.zone,
    since,
    url: new URL(`${base}${lastingQuery(book)}`, ports.site.publicUrl).href,
  });
  if (alreadyHas(request, printed.tag)) return notModified(printed.tag);
  return new Response(Buffer.from(await printed.bytes()), {
    headers: {
      'content-type': 'application/pdf',
      'content-disposition': `inline; filename="${book.classSlug}-${book.seasonSlug}.pdf"`,
      'cache-control': 'public, max-age=0, must-revalidate',
      etag: `"${printed.tag}"`,
    },
  });
};
