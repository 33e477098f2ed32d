import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { problem } from '@/http/problem';
import { clausesCsv } from '@/services/rulebook/file/clauses-csv';
import { findAsked } from '../_asked';

/** The clauses in force as CSV; the penalty schedule is not in it. */
export const GET: APIRoute = async ({ locals, params, url }) => {
  const asked = await findAsked(locals.ports, params, url);
  if (asked?.book.standing === undefined || asked.unread) return problem(absent());
  const { book } = asked;
  return new Response(clausesCsv(asked.book.standing.rules.clauses), {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="${book.classSlug}-${book.seasonSlug}.csv"`,
    },
  });
};
