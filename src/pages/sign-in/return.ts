import type { APIRoute } from 'astro';
import * as z from 'zod/mini';
import { failure } from '@/domain/failure';
import { safePath } from '@/http/form';
import { problem } from '@/http/problem';
import { cookieOptions, SESSION_COOKIE, SIGN_IN_COOKIE } from '@/http/session-cookie';
import { SESSION_SECONDS } from '@/services/session/start-session';
import { finishProviderSignIn } from '@/services/sign-in/finish-provider-sign-in';

const keptShape = z.object({
  state: z.string(),
  nonce: z.string(),
  verifier: z.string(),
  returnTo: z.string(),
});

const findKept = (text: string | undefined) => {
  try {
    const read = z.safeParse(keptShape, JSON.parse(text ?? ''));
    return read.success ? read.data : undefined;
  } catch {
    return undefined;
  }
};

export const GET: APIRoute = async ({ locals, cookies, redirect, url, request }) => {
  const { ports } = locals;
  const kept = findKept(cookies.get(SIGN_IN_COOKIE)?.value);
  cookies.delete(SIGN_IN_COOKIE, { path: '/' });
  const code = url.searchParams.get('code');
  if (kept === undefined || code === null || url.searchParams.get('state') !== kept.state) {
    return problem(
      failure(
        'link-spent',
        'This sign-in was not begun in this browser, or it was broken off. Start it once more.',
      ),
      400,
    );
  }
  const signedIn = await finishProviderSignIn(ports, {
    code,
    verifier: kept.verifier,
    nonce: kept.nonce,
    agent: request.headers.get('user-agent') ?? '',
    previousToken: cookies.get(SESSION_COOKIE)?.value,
  });
  if (!signedIn.ok) return problem(signedIn.failure);
  const { token } = signedIn.value;
  cookies.set(SESSION_COOKIE, token, cookieOptions(ports.site.publicUrl, SESSION_SECONDS));
  return redirect(safePath(kept.returnTo, '/enter'), 303);
};
