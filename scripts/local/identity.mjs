import { createHash, generateKeyPairSync, randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Provider, { interactionPolicy } from 'oidc-provider';
import { answer, css, escapeHtml, host, listen, page } from './listen.mjs';

/**
 * Somebody who can be chosen on the sign-in page.
 *
 * @typedef {object} Person
 * @property {string} subject stable and unique
 * @property {string} name
 * @property {string} email
 * @property {string} part what this person does in the demo, in a few words
 */

/**
 * @param {string} file JSON: `{ people: Person[] }`; none yet is an empty list
 * @returns {Person[]}
 */
export const peopleIn = (file) =>
  existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')).people : [];

/** @param {string} folder */
function secretsIn(folder) {
  const file = join(folder, 'keys.json');
  if (!existsSync(file)) {
    mkdirSync(folder, { recursive: true });
    const rsa = generateKeyPairSync('rsa', { modulusLength: 2048 }).privateKey;
    const curve = generateKeyPairSync('ec', { namedCurve: 'P-256' }).privateKey;
    const keys = [
      { ...rsa.export({ format: 'jwk' }), kid: 'rsa-1', use: 'sig', alg: 'RS256' },
      { ...curve.export({ format: 'jwk' }), kid: 'curve-1', use: 'sig', alg: 'ES256' },
    ];
    const secrets = { jwks: { keys }, cookieKey: randomBytes(32).toString('hex') };
    writeFileSync(file, JSON.stringify(secrets), { mode: 0o600, flag: 'wx' });
  }
  return /** @type {{ jwks: { keys: object[] }, cookieKey: string }} */ (
    JSON.parse(readFileSync(file, 'utf8'))
  );
}

/** Asks who it is at every sign-in, so that one browser can play several people. */
function policy() {
  const base = interactionPolicy.base();
  const { Check } = interactionPolicy;
  base
    .get('login')
    .checks.add(
      new Check('choose_person', 'A person is chosen at each sign-in', (context) =>
        context.oidc.result?.login === undefined ? Check.REQUEST_PROMPT : Check.NO_NEED_TO_PROMPT,
      ),
    );
  base.remove('consent');
  return base;
}

/**
 * @param {string} uid
 * @param {readonly Person[]} people
 */
const chooser = (uid, people) => {
  const entries = people.map(
    (person) => `<li><form method="post" action="/interaction/${uid}">
<button name="subject" value="${escapeHtml(person.subject)}">${escapeHtml(person.name)}<small>${escapeHtml(person.part)}</small></button></form></li>`,
  );
  return page(
    'Who is signing in?',
    `<p>This identity provider runs on this machine only and asks for no password.</p><ul>${entries.join('')}</ul>
<h2>Somebody else</h2><form method="post" action="/interaction/${uid}">
<label>Name <input name="name" required maxlength="120" autocomplete="off"></label>
<label>E-mail <input name="email" type="email" required maxlength="200" autocomplete="off"></label>
<button>Sign in</button></form>`,
  );
};

/**
 * @param {import('node:http').IncomingMessage} request
 * @returns {Promise<URLSearchParams>}
 */
async function formOf(request) {
  let text = '';
  for await (const chunk of request) {
    text += chunk;
    if (text.length > 4096) break;
  }
  return new URLSearchParams(text);
}

/**
 * An OpenID Connect provider for one machine: authorization code with PKCE, ID tokens signed with
 * RS256 (or ES256 where the client asks), the chosen person's name and verified e-mail as claims.
 *
 * @param {object} options
 * @param {number} options.port
 * @param {string} options.folder where its keys are kept
 * @param {string} options.peopleFile read anew at each sign-in
 * @param {string} options.clientId
 * @param {string} options.clientSecret
 * @param {readonly string[]} options.redirectUris
 * @param {'RS256' | 'ES256'} [options.algorithm]
 * @returns {Promise<import('./listen.mjs').Running>}
 */
export async function startIdentityProvider(options) {
  const issuer = `http://${host}:${options.port}`;
  const secrets = secretsIn(options.folder);
  /** @type {Map<string, Person>} people who typed their name */
  const guests = new Map();

  /** @param {string} subject */
  const find = (subject) =>
    peopleIn(options.peopleFile).find((person) => person.subject === subject) ??
    guests.get(subject);

  const provider = new Provider(issuer, {
    clients: [
      {
        client_id: options.clientId,
        client_secret: options.clientSecret,
        redirect_uris: options.redirectUris,
        response_types: ['code'],
        grant_types: ['authorization_code'],
        token_endpoint_auth_method: 'client_secret_basic',
        id_token_signed_response_alg: options.algorithm ?? 'RS256',
      },
    ],
    jwks: secrets.jwks,
    cookies: { keys: [secrets.cookieKey] },
    claims: { openid: ['sub'], email: ['email', 'email_verified'], profile: ['name'] },
    conformIdTokenClaims: false,
    pkce: { required: () => true },
    features: { devInteractions: { enabled: false }, rpInitiatedLogout: { enabled: false } },
    interactions: {
      policy: policy(),
      url: (/** @type {unknown} */ _context, /** @type {{ uid: string }} */ interaction) =>
        `/interaction/${interaction.uid}`,
    },
    ttl: {
      Interaction: 900,
      Session: 3600,
      Grant: 3600,
      AccessToken: 600,
      IdToken: 600,
      AuthorizationCode: 60,
    },
    findAccount: (/** @type {unknown} */ _context, /** @type {string} */ subject) => {
      const person = find(subject);
      if (person === undefined) return undefined;
      const claims = { sub: subject, name: person.name, email: person.email, email_verified: true };
      return { accountId: subject, claims: () => claims };
    },
    loadExistingGrant: async (/** @type {import('oidc-provider').Context} */ context) => {
      const accountId = context.oidc.session?.accountId;
      const clientId = context.oidc.client?.clientId;
      if (accountId === undefined || clientId === undefined) return undefined;
      const grant = new provider.Grant({ accountId, clientId });
      grant.addOIDCScope('openid email profile');
      await grant.save();
      return grant;
    },
    renderError: (
      /** @type {import('oidc-provider').Context} */ context,
      /** @type {Record<string, string>} */ out,
    ) => {
      context.type = 'html';
      const said = Object.values(out).map((value) => `<p>${escapeHtml(String(value))}</p>`);
      context.body = page('Sign-in could not go on', said.join(''));
    },
  });
  provider.on('server_error', (_context, error) => console.error(error));
  const protocol = provider.callback();

  /**
   * @param {import('node:http').IncomingMessage} request
   * @param {import('node:http').ServerResponse} response
   */
  async function interact(request, response) {
    const { uid } = await provider.interactionDetails(request, response);
    const html = 'text/html; charset=utf-8';
    if (request.method !== 'POST') {
      return answer(response, 200, html, chooser(uid, peopleIn(options.peopleFile)));
    }
    const form = await formOf(request);
    const subject = form.get('subject') ?? remember(form.get('name'), form.get('email'));
    if (subject === undefined || find(subject) === undefined) {
      return answer(
        response,
        400,
        html,
        page('Nobody was chosen', '<p>Go back and choose a person.</p>'),
      );
    }
    const result = { login: { accountId: subject, remember: false } };
    return provider.interactionFinished(request, response, result, {
      mergeWithLastSubmission: false,
    });
  }

  /**
   * @param {string | null} name
   * @param {string | null} typed
   */
  function remember(name, typed) {
    const email = typed?.trim().toLowerCase() ?? '';
    if (name === null || name.trim() === '' || !/^[^@\s]+@[^@\s]+$/.test(email)) return undefined;
    const listed = peopleIn(options.peopleFile).find((person) => person.email === email);
    if (listed !== undefined) return listed.subject;
    const subject = `guest-${createHash('sha256').update(email).digest('hex').slice(0, 24)}`;
    guests.set(subject, { subject, name: name.trim(), email, part: '' });
    return subject;
  }

  return listen(options.port, (request, response) => {
    const path = request.url?.split('?')[0] ?? '/';
    if (path === '/plain.css') return answer(response, 200, 'text/css', css);
    if (!path.startsWith('/interaction/')) return protocol(request, response);
    interact(request, response).catch((error) => {
      const said = `<p>${escapeHtml(error instanceof Error ? error.message : String(error))}</p><p>Begin the sign-in again.</p>`;
      answer(response, 400, 'text/html; charset=utf-8', page('Sign-in could not go on', said));
    });
    return undefined;
  });
}
