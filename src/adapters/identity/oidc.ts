import { CodeChallengeMethod, generateCodeVerifier, generateState, OAuth2Client } from 'arctic';
import { createRemoteJWKSet, jwtVerify } from 'jose';
import * as z from 'zod';
import type { IdentityProvider } from '@/services/ports';

export interface IdentityConfig {
  readonly issuer: string;
  readonly clientId: string;
  readonly clientSecret: string;
  readonly redirectUri: string;
}

const PATIENCE_MS = 10_000;

const discovery = z.object({
  issuer: z.string(),
  authorization_endpoint: z.url(),
  token_endpoint: z.url(),
  jwks_uri: z.url(),
});

const claims = z.object({
  sub: z.string().min(1),
  email: z.email(),
  email_verified: z.boolean().default(false),
  name: z.string().default(''),
  nonce: z.string(),
  auth_time: z.number().optional(),
});

/** OpenID Connect, authorization code with PKCE. The ID token's signature and claims are verified here. */
export const openIdentityProvider = (config: IdentityConfig): IdentityProvider => {
  const client = new OAuth2Client(config.clientId, config.clientSecret, config.redirectUri);
  let known: Promise<{
    meta: z.infer<typeof discovery>;
    keys: ReturnType<typeof createRemoteJWKSet>;
  }>;
  const discover = () => {
    known ??= (async () => {
      const base = config.issuer.replace(/\/$/, '');
      const answer = await fetch(`${base}/.well-known/openid-configuration`, {
        signal: AbortSignal.timeout(PATIENCE_MS),
      });
      if (!answer.ok) throw new Error(`The identity provider answered ${answer.status}.`);
      const meta = discovery.parse(await answer.json());
      if (meta.issuer !== config.issuer)
        throw new Error('The identity provider names another issuer.');
      return { meta, keys: createRemoteJWKSet(new URL(meta.jwks_uri)) };
    })();
    known.catch(() => {
      known = undefined as never;
    });
    return known;
  };
  return {
    begin: async ({ fresh }) => {
      const { meta } = await discover();
      const state = generateState();
      const nonce = generateState();
      const verifier = generateCodeVerifier();
      const url = client.createAuthorizationURLWithPKCE(
        meta.authorization_endpoint,
        state,
        CodeChallengeMethod.S256,
        verifier,
        ['openid', 'email', 'profile'],
      );
      url.searchParams.set('nonce', nonce);
      if (fresh) {
        url.searchParams.set('prompt', 'login');
        url.searchParams.set('max_age', '0');
      }
      return { url: url.toString(), state, nonce, verifier };
    },
    finish: async ({ code, verifier, nonce }) => {
      const { meta, keys } = await discover();
      const tokens = await client.validateAuthorizationCode(meta.token_endpoint, code, verifier);
      const { payload } = await jwtVerify(tokens.idToken(), keys, {
        issuer: meta.issuer,
        audience: config.clientId,
        algorithms: ['RS256', 'ES256', 'PS256', 'EdDSA'],
        requiredClaims: ['exp', 'iat', 'sub', 'nonce'],
        clockTolerance: 5,
      });
      const read = claims.parse(payload);
      if (read.nonce !== nonce) throw new Error('The ID token answers another sign-in.');
      return {
        issuer: meta.issuer,
        subject: read.sub,
        email: read.email.toLowerCase(),
        emailVerified: read.email_verified,
        name: read.name,
      };
    },
  };
};
