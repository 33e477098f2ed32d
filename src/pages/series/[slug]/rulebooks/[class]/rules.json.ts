import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { toHex } from '@/domain/ledger/bytes';
import { problem } from '@/http/problem';
import { findAsked } from '../_asked';

/** The rules in force exactly as they are hashed: SHA-256 of these bytes is the printed hash. */
export const GET: APIRoute = async ({ locals, params, url }) => {
  const asked = await findAsked(locals.ports, params, url);
  if (asked?.book.standing === undefined || asked.unread) return problem(absent());
  const { document, hash } = asked.book.standing;
  return new Response(document, {
    headers: { 'content-type': 'application/json', etag: `"${toHex(hash)}"` },
  });
};
