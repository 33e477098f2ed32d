import { existsSync } from 'node:fs';
import { request as httpRequest } from 'node:http';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readProduct } from '../support/product';

const { publicUrl } = readProduct();

/** A raw request, for headers that `fetch` does not let one set. */
const raw = (
  path: string,
  options: { method?: string; headers?: Record<string, string>; body?: Iterable<Buffer> } = {},
): Promise<{ status: number; text: string }> =>
  new Promise((resolve, reject) => {
    const request = httpRequest(
      new URL(path, publicUrl),
      { method: options.method ?? 'GET', headers: options.headers ?? {} },
      (response) => {
        const parts: Buffer[] = [];
        response.on('data', (part: Buffer) => parts.push(part));
        response.on('end', () =>
          resolve({
            status: response.statusCode ?? 0,
            text: Buffer.concat(parts).toString('utf8'),
          }),
        );
      },
    );
    request.on('error', reject);
    for (const part of options.body ?? []) request.write(part);
    request.end();
  });

describe('the front line', () => {
  it('refuses a write that comes from another site, or does not say where it comes from', async () => {
    const form = { 'content-type': 'application/x-www-form-urlencoded' };
    const json = { 'content-type': 'application/json' };
    const from = (headers: Record<string, string>) =>
      fetch(`${publicUrl}/sign-out`, { method: 'POST', headers, redirect: 'manual' });
    expect((await from({ ...form, origin: 'http://elsewhere.example.org' })).status).toBe(403);
    expect((await from({ ...json, origin: 'null' })).status).toBe(403);
    const silent = await raw('/sign-out', {
      method: 'POST',
      headers: { ...json, cookie: 'tagwire_session=x' },
    });
    expect(silent.status).toBe(403);
    expect((await from({ ...form, origin: publicUrl })).status).toBe(303);
  });

  it('takes no body beyond its limit, announced or not', async () => {
    const announced = await fetch(`${publicUrl}/api/bench/assess`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin: publicUrl },
      body: 'x'.repeat(1_100_000),
    });
    expect(announced.status).toBe(413);
    expect(announced.headers.get('content-type')).toBe('application/problem+json');
    const chunks = Array.from({ length: 20 }, () => Buffer.alloc(100_000, 120));
    // Cut off while it is still being sent, the answer may or may not get through.
    const chunked = await raw('/api/bench/assess', {
      method: 'POST',
      headers: {
        'content-type': 'application/json',
        origin: publicUrl,
        'transfer-encoding': 'chunked',
      },
      body: chunks,
    }).then(
      ({ status }) => status,
      () => 'cut off',
    );
    expect([413, 'cut off']).toContain(chunked);
  });

  it('still takes a small body in pieces', async () => {
    const { status, text } = await raw('/api/bench/uncertainty', {
      method: 'POST',
      headers: {
        'content-type': 'application/json',
        origin: publicUrl,
        'transfer-encoding': 'chunked',
      },
      body: [
        Buffer.from('{"unit":"in","components":[{"name":"a",'),
        Buffer.from('"standardUncertainty":"0.0001"}]}'),
      ],
    });
    expect([status, text]).toEqual([200, expect.stringContaining('"combined"')]);
  });

  it('serves no image transformation', async () => {
    expect((await fetch(`${publicUrl}/_image?href=/favicon.svg&f=avif`)).status).toBe(404);
  });

  it('renders its error pages anew, none lies ready made', async () => {
    const client = join(import.meta.dirname, '../../dist/client');
    expect(existsSync(join(client, '404.html'))).toBe(false);
    expect(existsSync(join(client, '500.html'))).toBe(false);
    const { status, text } = await raw('/no-such-page');
    expect([status, text]).toEqual([404, expect.stringContaining('Nothing here')]);
  });

  it('does not believe a foreign Host or a forwarded one', async () => {
    const foreign = await raw('/', { headers: { host: 'elsewhere.example.org' } });
    expect(foreign.text).not.toContain('elsewhere.example.org');
    const forwarded = await raw('/', {
      headers: { 'x-forwarded-host': 'elsewhere.example.org', 'x-forwarded-for': '203.0.113.9' },
    });
    expect(forwarded.text).not.toContain('elsewhere.example.org');
  });

  it('sends its policy with every page, without unsafe-inline', async () => {
    for (const path of ['/', '/no-such-page', '/api/openapi.json']) {
      const { headers } = await fetch(`${publicUrl}${path}`);
      const policy = headers.get('content-security-policy') ?? '';
      expect([path, policy]).toEqual([path, expect.stringContaining("default-src 'none'")]);
      expect(policy).not.toContain('unsafe');
      expect(headers.get('x-content-type-options')).toBe('nosniff');
    }
  });

  it('says in problem details what is wrong with a request', async () => {
    const send = (body: string, type = 'application/json') =>
      fetch(`${publicUrl}/api/bench/assess`, {
        method: 'POST',
        headers: { 'content-type': type, origin: publicUrl },
        body,
      });
    expect((await send('{')).status).toBe(400);
    expect((await send('a=b', 'text/plain')).status).toBe(415);
    const wrong = await send('{"requirement":{}}');
    expect(wrong.status).toBe(422);
    expect(await wrong.json()).toMatchObject({
      type: '/problems/invalid',
      errors: expect.arrayContaining([expect.objectContaining({ pointer: '/value' })]),
    });
  });
});
