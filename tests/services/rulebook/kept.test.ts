import { describe, expect, it } from 'vitest';
import { alreadyHas, findKeptPage, keepPage, pageTag } from '@/http/kept-pages';
import { Kept } from '@/services/rulebook/kept';

describe('values that are kept', () => {
  it('go when there are too many, the one unused longest first', () => {
    const kept = new Kept<number>(2);
    kept.keep('a', 1);
    kept.keep('b', 2);
    expect(kept.find('a')).toBe(1);
    kept.keep('c', 3);
    expect([kept.find('a'), kept.find('b'), kept.find('c')]).toEqual([1, undefined, 3]);
  });

  it('go when they weigh too much together; a new value takes the place of the old', () => {
    const kept = new Kept<string>(9, 10);
    kept.keep('a', 'x', 6);
    kept.keep('a', 'y', 4);
    kept.keep('b', 'z', 6);
    expect([kept.find('a'), kept.find('b')]).toEqual(['y', 'z']);
    kept.keep('c', 'w', 5);
    expect([kept.find('a'), kept.find('b'), kept.find('c')]).toEqual([undefined, undefined, 'w']);
    kept.keep('d', 'too heavy', 11);
    expect([kept.find('c'), kept.find('d')]).toEqual([undefined, undefined]);
  });
});

describe('a page that is rendered once', () => {
  const ask = (headers: Record<string, string> = {}) =>
    new Request('http://127.0.0.1/series/x', { headers });

  it('is served under the tag of what it is made from, and not sent twice', async () => {
    const tag = pageTag(['rules', 1]);
    expect(pageTag(['rules', 2])).not.toBe(tag);
    expect(findKeptPage(ask(), tag)).toBeUndefined();
    const first = await keepPage(
      tag,
      new Response('<p>Rules</p>', { headers: { 'content-type': 'text/html' } }),
    );
    const again = findKeptPage(ask(), tag);
    expect(await again?.text()).toBe(await first.text());
    for (const response of [first, again]) {
      expect(response?.headers.get('content-type')).toBe('text/html');
      expect(response?.headers.get('etag')).toBe(`W/"${tag}"`);
      expect(response?.headers.get('cache-control')).toBe('public, max-age=0, must-revalidate');
    }
    const known = ask({ 'if-none-match': `"other", W/"${tag}"` });
    expect(alreadyHas(known, tag)).toBe(true);
    expect(findKeptPage(known, tag)?.status).toBe(304);
  });

  it('is not kept when it failed, or was for one person', async () => {
    await keepPage('failed', new Response('', { status: 404 }));
    await keepPage('own', new Response('', { headers: { 'set-cookie': 'a=b' } }));
    expect([findKeptPage(ask(), 'failed'), findKeptPage(ask(), 'own')]).toEqual([
      undefined,
      undefined,
    ]);
  });
});
