import type { AstroCookieSetOptions } from 'astro';

export const SESSION_COOKIE = 'tagwire_session';
export const SIGN_IN_COOKIE = 'tagwire_sign_in';

export const cookieOptions = (publicUrl: string, seconds: number): AstroCookieSetOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  secure: publicUrl.startsWith('https://'),
  path: '/',
  maxAge: seconds,
});
