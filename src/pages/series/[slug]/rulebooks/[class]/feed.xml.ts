import type { APIRoute } from 'astro';
import { absent } from '@/domain/failure';
import { problem } from '@/http/problem';
import { PUBLICATION_NAMES } from '@/services/rulebook/publication';
import { findAsked } from '../_asked';

const escapeXml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    // Characters that XML 1.0 cannot hold.
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, '');

/** Everything published for the class, newest first (Atom, RFC 4287). */
export const GET: APIRoute = async ({ locals, params, url }) => {
  const asked = await findAsked(locals.ports, params, url);
  if (asked === undefined) return problem(absent());
  const { book, base } = asked;
  const home = new URL(base, locals.ports.site.publicUrl).href;
  const entries = book.publications.map((one) => {
    const path = one.kind === 'bulletin' ? `${home}/bulletins/${one.number}` : home;
    return [
      '<entry>',
      `<id>urn:uuid:${one.id}</id>`,
      `<title>${escapeXml(`${PUBLICATION_NAMES[one.kind]} ${one.number}: ${one.title}`)}</title>`,
      `<link href="${escapeXml(path)}"/>`,
      `<updated>${one.publishedAt}</updated>`,
      `<summary>${escapeXml(one.inForceAt === null ? 'Counts from the next event.' : `Counts from ${one.inForceAt}.`)}</summary>`,
      '</entry>',
    ].join('');
  });
  const updated = book.publications[0]?.publishedAt ?? '1970-01-01T00:00:00.000Z';
  const feed = [
    '<?xml version="1.0" encoding="utf-8"?>',
    '<feed xmlns="http://www.w3.org/2005/Atom">',
    `<id>urn:uuid:${book.classId}</id>`,
    `<title>${escapeXml(`${book.className} rules, ${book.seriesName}`)}</title>`,
    `<author><name>${escapeXml(book.seriesName)}</name></author>`,
    `<link href="${escapeXml(home)}"/>`,
    `<link rel="self" href="${escapeXml(`${home}/feed.xml`)}"/>`,
    `<updated>${updated}</updated>`,
    ...entries,
    '</feed>',
  ].join('\n');
  return new Response(feed, {
    headers: { 'content-type': 'application/atom+xml; charset=utf-8' },
  });
};
