import type { APIRoute } from 'astro';
import { openApi } from '@/contracts/openapi';
import type { Operation } from '@/contracts/operation';

const lists = import.meta.glob<{ readonly operations: readonly Operation[] }>(
  '/src/contracts/*/operations.ts',
  { eager: true },
);

export const allOperations = Object.values(lists).flatMap((list) => list.operations);

/** What the API takes and answers, made from the contracts themselves. */
export const GET: APIRoute = ({ locals }) =>
  new Response(JSON.stringify(openApi(allOperations, locals.ports.site.publicUrl)), {
    headers: { 'content-type': 'application/json', 'cache-control': 'public, max-age=300' },
  });
