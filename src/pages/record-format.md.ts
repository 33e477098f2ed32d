import type { APIRoute } from 'astro';
import text from '../../docs/record-format.md?raw';

export const prerender = false;

/** The document from which a stranger can write a verifier. */
export const GET: APIRoute = () =>
  new Response(text, { headers: { 'content-type': 'text/markdown; charset=utf-8' } });
