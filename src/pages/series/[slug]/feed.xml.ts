import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { DECISION_WORDS } from '@/domain/verdict/notice/notice-words';
import { problem } from '@/http/problem';
import { findSeriesHead } from '@/services/public/find-series-head';
import { listNotices } from '@/services/public/list-notices';

const xml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');

/** Published notices as an Atom feed (RFC 4287). */
export const GET: APIRoute = async ({ params, locals }) => {
  const { ports } = locals;
  const head = await findSeriesHead(ports, params.slug ?? '');
  if (head === undefined) return problem(absent());
  const { notices } = await listNotices(ports, { seriesId: head.id });
  const base = `${ports.site.publicUrl}/series/${head.slug}`;
  const updated = notices[0]?.publishedAt ?? '2000-01-01T00:00:00Z';
  const entries = notices.map((row) => {
    const url = `${base}/verdicts/${row.number}`;
    const title = `Notice ${row.number}: car ${row.car}, ${DECISION_WORDS[row.decision].toLowerCase()}`;
    const summary = [
      `${row.className}, event ${row.event.number}, ${row.event.track}.`,
      row.decision === 'breach'
        ? `Clause ${row.clauses.join(', ')}. ${row.penalty}.`
        : 'Result stands.',
    ].join(' ');
    return `<entry><id>${xml(url)}</id><title>${xml(title)}</title><link href="${xml(url)}"/><published>${row.publishedAt}</published><updated>${row.publishedAt}</updated><summary>${xml(summary)}</summary></entry>`;
  });
  const feed = [
    '<?xml version="1.0" encoding="utf-8"?>',
    '<feed xmlns="http://www.w3.org/2005/Atom">',
    `<id>${xml(base)}</id><title>${xml(head.name)}: notices</title><updated>${updated}</updated>`,
    `<author><name>${xml(head.name)}</name></author>`,
    `<link rel="self" href="${xml(`${base}/feed.xml`)}"/><link href="${xml(base)}"/>`,
    ...entries,
    '</feed>',
  ].join('\n');
  return new Response(feed, {
    headers: {
      'content-type': 'application/atom+xml; charset=utf-8',
      'cache-control': 'public, max-age=60',
    },
  });
};
