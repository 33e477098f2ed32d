import type { APIRoute } from 'astro';
import { listCheckpoints } from '@/services/ledger/checkpoint/find-checkpoint';
import { findLedgerSeries } from '@/services/ledger/proof/find-series';

export const prerender = false;

const escapeXml = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');

/** The signed heads as an Atom feed (RFC 4287): who follows it is a witness. */
export const GET: APIRoute = async ({ locals, params }) => {
  const { ports } = locals;
  const series = await findLedgerSeries(ports, params['slug'] ?? '');
  if (series === undefined) return new Response(null, { status: 404 });
  const heads = await listCheckpoints(ports.db, series.id, 100);
  const at = `${ports.site.publicUrl}/series/${series.slug}/ledger`;
  const entries = heads.map(
    ({ size, note, signedAt }) => `  <entry>
    <id>urn:uuid:${series.id}#${size}</id>
    <title>${size} lines</title>
    <updated>${signedAt}</updated>
    <link rel="alternate" href="${ports.site.publicUrl}/api/ledger/${series.slug}/checkpoint?size=${size}"/>
    <content type="text">${escapeXml(note)}</content>
  </entry>`,
  );
  const feed = `<?xml version="1.0" encoding="utf-8"?>
<feed xmlns="http://www.w3.org/2005/Atom">
  <id>urn:uuid:${series.id}</id>
  <title>${escapeXml(series.name)}: signed heads of the ledger</title>
  <author><name>${escapeXml(series.name)}</name></author>
  <updated>${heads[0]?.signedAt ?? '1970-01-01T00:00:00.000Z'}</updated>
  <link rel="self" href="${at}/feed.xml"/>
  <link rel="alternate" href="${at}"/>
${entries.join('\n')}
</feed>
`;
  return new Response(feed, {
    headers: { 'content-type': 'application/atom+xml; charset=utf-8', 'cache-control': 'no-cache' },
  });
};
