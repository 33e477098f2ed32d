import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { problem } from '@/http/problem';
import { findAsked } from '../_asked';

/** The clauses and penalties in force as a rulebook file, to be imported elsewhere. */
export const GET: APIRoute = async ({ locals, params, url }) => {
  const asked = await findAsked(locals.ports, params, url);
  if (asked?.book.standing === undefined || asked.unread) return problem(absent());
  const { book } = asked;
  const { clauses, penalties } = asked.book.standing.rules;
  const title = `${book.className}, season ${book.seasonName}`;
  const file = { format: 'tagwire/rulebook', version: '1', title, clauses, penalties };
  return new Response(JSON.stringify(file, null, 2), {
    headers: {
      'content-type': 'application/json',
      'content-disposition': `attachment; filename="${book.classSlug}-${book.seasonSlug}.json"`,
    },
  });
};
