import type { APIRoute } from 'astro';
import * as z from 'zod/mini';
import { rulebookFile } from '@/contracts/rulebook/edition';

/** The format of a rulebook as a file, made from the contract that reads it. */
export const GET: APIRoute = ({ locals }) => {
  const schema = z.toJSONSchema(rulebookFile, { io: 'input', unrepresentable: 'any' });
  const body = {
    ...schema,
    $id: `${locals.ports.site.publicUrl}/api/rulebooks/schema.json`,
    title: 'Rulebook',
  };
  return new Response(JSON.stringify(body, null, 2), {
    headers: { 'content-type': 'application/schema+json', 'cache-control': 'public, max-age=300' },
  });
};
