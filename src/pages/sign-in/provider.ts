import type { APIRoute } from 'astro';
import { failure } from '@/domain/failure';
import { safePath } from '@/http/form';
import { problem } from '@/http/problem';
import { cookieOptions, SIGN_IN_COOKIE } from '@/http/session-cookie';

const MINUTES = 10;

/** A link, not a form: the policy `form-action 'self'` would stop a post that leads elsewhere. */
export const GET: APIRoute = async ({ locals, cookies, redirect, url }) => {
  const { identity, site } = locals.ports;
  try {
    const fresh = url.searchParams.get('fresh') === 'yes';
    const begun = await identity.begin({ fresh });
    const kept = {
      state: begun.state,
      nonce: begun.nonce,
      verifier: begun.verifier,
      returnTo: safePath(url.searchParams.get('return'), '/enter'),
    };
    cookies.set(SIGN_IN_COOKIE, JSON.stringify(kept), cookieOptions(site.publicUrl, MINUTES * 60));
    return redirect(begun.url, 302);
  } catch {
    return problem(
      failure(
        'unavailable',
        'The identity provider does not answer. Use the e-mail link, or try later.',
      ),
    );
  }
};
