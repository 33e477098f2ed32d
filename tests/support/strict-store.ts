import { createHash, createHmac, timingSafeEqual } from 'node:crypto';
import { createServer, type IncomingMessage, request, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';

const hmac = (key: string | Buffer, text: string): Buffer =>
  createHmac('sha256', key).update(text).digest();
const encode = (text: string): string =>
  encodeURIComponent(text).replace(
    /[!'()*]/g,
    (one) => `%${one.charCodeAt(0).toString(16).toUpperCase()}`,
  );

/** Why a signed address is refused, by AWS Signature Version 4 for query strings; nothing where it holds. */
const refusalOf = (incoming: IncomingMessage, secret: string, now: Date): string | undefined => {
  const url = new URL(incoming.url ?? '/', 'http://store.invalid');
  const query = url.searchParams;
  const signature = query.get('X-Amz-Signature');
  const [, day = '', region = '', service = ''] = (query.get('X-Amz-Credential') ?? '').split('/');
  const at = query.get('X-Amz-Date') ?? '';
  if (signature === null) return 'AccessDenied';
  const issued = Date.parse(at.replace(/^(....)(..)(..)T(..)(..)(..)Z$/, '$1-$2-$3T$4:$5:$6Z'));
  if (now.getTime() > issued + Number(query.get('X-Amz-Expires')) * 1000) return 'Expired';
  const signed = query.get('X-Amz-SignedHeaders') ?? '';
  const canonical = [
    incoming.method,
    url.pathname,
    [...query]
      .filter(([name]) => name !== 'X-Amz-Signature')
      .map(([name, value]) => `${encode(name)}=${encode(value)}`)
      .sort()
      .join('&'),
    ...signed.split(';').map((name) => `${name}:${String(incoming.headers[name] ?? '').trim()}`),
    '',
    signed,
    query.get('X-Amz-Content-Sha256') ?? 'UNSIGNED-PAYLOAD',
  ].join('\n');
  const toSign = [
    'AWS4-HMAC-SHA256',
    at,
    `${day}/${region}/${service}/aws4_request`,
    createHash('sha256').update(canonical).digest('hex'),
  ].join('\n');
  const key = ['aws4_request'].reduce<Buffer>(
    hmac,
    hmac(hmac(hmac(`AWS4${secret}`, day), region), service),
  );
  const right = hmac(key, toSign);
  const given = Buffer.from(signature, 'hex');
  return given.length === right.length && timingSafeEqual(given, right)
    ? undefined
    : 'SignatureDoesNotMatch';
};

/**
 * A store that checks what the stand-in does not: signature, expiry, and every signed header, the
 * length and the type among them. What holds goes on to `target`.
 */
export const startStrictStore = async (
  target: string,
  secret: string,
  now: () => Date = () => new Date(),
): Promise<{ readonly url: string; readonly stop: () => Promise<void> }> => {
  const { port: targetPort, hostname } = new URL(target);
  const answer = (incoming: IncomingMessage, response: ServerResponse) => {
    const refused = refusalOf(incoming, secret, now());
    if (refused !== undefined) {
      incoming.resume();
      response.writeHead(403, { 'content-type': 'application/xml' });
      response.end(`<Error><Code>${refused}</Code></Error>`);
      return;
    }
    const { method = 'GET', url = '/', headers } = incoming;
    const on = request({ hostname, port: targetPort, method, path: url, headers }, (from) => {
      response.writeHead(from.statusCode ?? 502, from.headers);
      from.pipe(response);
    });
    on.on('error', () => response.destroy());
    incoming.pipe(on);
  };
  const server = createServer(answer);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}`,
    stop: () =>
      new Promise((resolve) => {
        server.closeAllConnections();
        server.close(() => resolve());
      }),
  };
};
