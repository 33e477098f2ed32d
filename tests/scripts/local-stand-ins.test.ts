import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { GetObjectCommand, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { CodeChallengeMethod, generateCodeVerifier, OAuth2Client } from 'arctic';
import { createRemoteJWKSet, jwtVerify } from 'jose';
import { createTransport } from 'nodemailer';
import { afterAll, afterEach, expect, test } from 'vitest';
import { startIdentityProvider } from '../../scripts/local/identity.mjs';
import { startMailCatcher } from '../../scripts/local/mail.mjs';
import { objectStoreKeys, startObjectStore } from '../../scripts/local/object-store.mjs';
import { rememberedPorts } from '../../scripts/set-up/ports.mjs';

const folder = mkdtempSync(join(tmpdir(), 'tagwire-stand-ins-'));
const running: { stop: () => Promise<void> }[] = [];
afterEach(async () => {
  for (const server of running.splice(0)) await server.stop();
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const site = 'http://127.0.0.1:29999';

test('an object outlives the store’s restart and the site’s origin alone may read it in a browser', async () => {
  const options = { port: 0, folder: join(folder, 'objects'), bucket: 'tagwire', origins: [site] };
  const client = (endpoint: string) =>
    new S3Client({
      endpoint,
      region: 'us-east-1',
      credentials: objectStoreKeys,
      forcePathStyle: true,
      requestChecksumCalculation: 'WHEN_REQUIRED',
      responseChecksumValidation: 'WHEN_REQUIRED',
    });
  const first = await startObjectStore(options);
  const body = Buffer.from([0, 255, 13, 10, 0, 128]);
  await client(first.url).send(
    new PutObjectCommand({ Bucket: 'tagwire', Key: 'originals/a', Body: body }),
  );
  await first.stop();

  const second = await startObjectStore(options);
  running.push(second);
  const read = await client(second.url).send(
    new GetObjectCommand({ Bucket: 'tagwire', Key: 'originals/a' }),
  );
  expect(Buffer.from((await read.Body?.transformToByteArray()) ?? [])).toEqual(body);
  const asked = (origin: string) =>
    fetch(`${second.url}/tagwire/originals/a`, {
      method: 'OPTIONS',
      headers: { origin, 'access-control-request-method': 'PUT' },
    });
  expect((await asked(site)).status).toBe(200);
  expect((await asked('http://other.invalid')).status).toBe(403);
});

test('a message sent is listed with its links and attachments and kept as it was sent', async () => {
  const options = { smtpPort: 0, pagePort: 0, folder: join(folder, 'mail') };
  const first = await startMailCatcher(options);
  const attached = Buffer.from('%PDF-1.7 not really');
  await createTransport(first.smtpUrl).sendMail({
    from: 'Office <office@series.invalid>',
    to: 'Mara@Paddock.invalid',
    subject: 'Notice <1>',
    text: 'Read it here: http://127.0.0.1:29999/verdicts/1\nIt is <final>.',
    messageId: '<fixed@series.invalid>',
    attachments: [{ filename: 'notice.pdf', content: attached }],
  });
  await first.stop();

  const second = await startMailCatcher(options);
  running.push(second);
  const listed = await (await fetch(`${second.url}/messages.json?to=mara@paddock.invalid`)).json();
  expect(listed).toMatchObject([
    {
      to: ['mara@paddock.invalid'],
      subject: 'Notice <1>',
      messageId: '<fixed@series.invalid>',
      links: ['http://127.0.0.1:29999/verdicts/1'],
      attachments: [
        { name: 'notice.pdf', sha256: createHash('sha256').update(attached).digest('hex') },
      ],
    },
  ]);
  const [mail] = listed;
  const file = await fetch(`${second.url}/messages/${mail.id}/attachments/0`);
  expect(Buffer.from(await file.arrayBuffer())).toEqual(attached);
  const html = await (await fetch(`${second.url}/messages/${mail.id}`)).text();
  expect(html).toContain('<a href="http://127.0.0.1:29999/verdicts/1">');
  expect(html).not.toContain('<final>');
  expect(await (await fetch(second.url)).text()).toContain('Notice &#60;1&#62;');
  expect(readdirSync(options.folder).filter((name) => name.endsWith('.eml'))).toHaveLength(1);
  expect(await (await fetch(`${second.url}/messages.json?to=nobody@x.invalid`)).json()).toEqual([]);
});

/** Follows redirects by hand, keeping cookies, until one leads to `stopAt`. */
async function browse(start: string, stopAt: string, jar: Map<string, string>, form?: string) {
  let url = start;
  let body = form;
  for (let hops = 0; hops < 10; hops += 1) {
    const response = await fetch(url, {
      redirect: 'manual',
      headers: {
        cookie: [...jar].map(([name, value]) => `${name}=${value}`).join('; '),
        ...(body === undefined ? {} : { 'content-type': 'application/x-www-form-urlencoded' }),
      },
      ...(body === undefined ? {} : { method: 'POST', body }),
    });
    for (const cookie of response.headers.getSetCookie()) {
      const [pair = ''] = cookie.split(';');
      const at = pair.indexOf('=');
      jar.set(pair.slice(0, at), pair.slice(at + 1));
    }
    const to = response.headers.get('location');
    if (to === null) return { url, text: await response.text(), status: response.status };
    url = new URL(to, url).href;
    body = undefined;
    if (url.startsWith(stopAt)) return { url, text: '', status: response.status };
  }
  throw new Error('too many redirects');
}

async function identityProvider(algorithm: 'RS256' | 'ES256' = 'RS256') {
  const home = mkdtempSync(join(folder, 'identity-'));
  const peopleFile = join(home, 'people.json');
  const people = [
    { subject: 'mara', name: 'Mara Quill', email: 'mara@paddock.invalid', part: 'competitor' },
  ];
  writeFileSync(peopleFile, JSON.stringify({ people }));
  const ports = await rememberedPorts(join(home, 'ports.json'), ['identity']);
  const callback = `${site}/sign-in/callback`;
  const provider = await startIdentityProvider({
    port: ports.identity,
    folder: home,
    peopleFile,
    clientId: 'tagwire',
    clientSecret: 'secret',
    redirectUris: [callback],
    algorithm,
  });
  running.push(provider);
  return {
    issuer: provider.url,
    callback,
    client: new OAuth2Client('tagwire', 'secret', callback),
  };
}

test.each(['RS256', 'ES256'] as const)(
  'choosing a person ends in an ID token with name, e-mail and nonce (%s)',
  async (algorithm) => {
    const { issuer, callback, client } = await identityProvider(algorithm);
    const found = await (await fetch(`${issuer}/.well-known/openid-configuration`)).json();
    expect(found.issuer).toBe(issuer);
    const verifier = generateCodeVerifier();
    const url = client.createAuthorizationURLWithPKCE(
      found.authorization_endpoint,
      'state-1',
      CodeChallengeMethod.S256,
      verifier,
      ['openid', 'profile', 'email'],
    );
    url.searchParams.set('nonce', 'nonce-1');
    const jar = new Map<string, string>();
    for (const round of ['first', 'again, for nobody is remembered']) {
      const chooser = await browse(url.href, callback, jar);
      expect(chooser.text, round).toContain('Mara Quill');
      const back = await browse(chooser.url, callback, jar, 'subject=mara');
      const answer = new URL(back.url).searchParams;
      expect(answer.get('state')).toBe('state-1');
      const tokens = await client.validateAuthorizationCode(
        found.token_endpoint,
        answer.get('code') ?? '',
        verifier,
      );
      const keys = createRemoteJWKSet(new URL(found.jwks_uri));
      const verified = await jwtVerify(tokens.idToken(), keys, { issuer, audience: 'tagwire' });
      expect(verified.protectedHeader.alg).toBe(algorithm);
      expect(verified.payload).toMatchObject({
        sub: 'mara',
        name: 'Mara Quill',
        email: 'mara@paddock.invalid',
        email_verified: true,
        nonce: 'nonce-1',
      });
    }
  },
);

test('somebody who is not listed can type a name, and a request without PKCE is refused', async () => {
  const { issuer, callback } = await identityProvider();
  const query = new URLSearchParams({
    client_id: 'tagwire',
    redirect_uri: callback,
    response_type: 'code',
    scope: 'openid email',
    state: 's',
  });
  const refused = await browse(`${issuer}/auth?${query}`, callback, new Map());
  expect(new URL(refused.url).searchParams.get('error')).toBe('invalid_request');

  query.set('code_challenge', 'a'.repeat(43));
  query.set('code_challenge_method', 'S256');
  const jar = new Map<string, string>();
  const chooser = await browse(`${issuer}/auth?${query}`, callback, jar);
  const form = new URLSearchParams({ name: 'Ivo Tarn', email: 'Ivo@Barn.invalid' });
  const back = await browse(chooser.url, callback, jar, form.toString());
  expect(new URL(back.url).searchParams.get('code')).toMatch(/.{20}/);
});
