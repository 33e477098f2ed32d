import type { APIRoute } from 'astro';
import { SESSION_COOKIE } from '@/http/session-cookie';
import { signOut } from '@/services/session/sign-out';

export const POST: APIRoute = async ({ locals, cookies, redirect }) => {
  const token = cookies.get(SESSION_COOKIE)?.value;
  if (token !== undefined) await signOut(locals.ports, token);
  cookies.delete(SESSION_COOKIE, { path: '/' });
  return redirect('/', 303);
};
