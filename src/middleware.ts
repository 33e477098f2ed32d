import { sequence } from 'astro:middleware';
import type { APIContext, MiddlewareHandler } from 'astro';
import { composition } from '@/composition';
import type { Actor } from '@/domain/access/permission';
import { failure } from '@/domain/failure';
import { keepPage } from '@/http/kept-pages';
import { crossSite } from '@/http/origin';
import { problem } from '@/http/problem';
import { ROUTES } from '@/http/route-table';
import { SESSION_COOKIE } from '@/http/session-cookie';
import { findActor } from '@/services/session/find-actor';

let worker: Promise<void> | undefined;

/** Ports and person of this request. */
const wire: MiddlewareHandler = async (context, next) => {
  const app = await composition();
  // The built server starts the worker itself; under `astro dev` the first request does.
  if (import.meta.env.DEV && app.config.worker === 'in-process') {
    worker ??= app.startWorker();
    await worker;
  }
  if (crossSite(context.request, app.config.publicUrl)) {
    return problem(
      failure('absent', 'This was sent from another site and was not carried out.'),
      403,
    );
  }
  const ports = app.ports();
  const token = context.cookies.get(SESSION_COOKIE)?.value;
  Object.assign(context.locals, {
    requestId: ports.random.uuid(),
    ports,
    actor: token === undefined ? null : await findActor(ports, token),
  });
  const rendered = needsSignIn(context.routePattern, context.locals.actor)
    ? signInFor(context)
    : await next();
  const { keepAs } = context.locals;
  const response = keepAs === undefined ? rendered : await keepPage(keepAs, rendered);
  secure(response.headers, app.config.objects.publicEndpoint);
  response.headers.set('x-request-id', context.locals.requestId);
  if (context.locals.actor !== null && !response.headers.has('cache-control')) {
    response.headers.set('cache-control', 'private, no-store');
  }
  return response;
};

/** The route table is the first gate: what is not listed as public is for people who are signed in. */
const needsSignIn = (route: string, actor: Actor | null): boolean =>
  actor === null && ROUTES[route]?.access !== 'public';

const signInFor = ({ url, request, redirect }: APIContext): Response =>
  url.pathname.startsWith('/api/') || request.method !== 'GET'
    ? problem(failure('sign-in-required', 'Sign in, then send it again.'))
    : redirect(`/sign-in?return=${encodeURIComponent(url.pathname + url.search)}`, 303);

/** What the page may reach besides itself: the object store, to which photographs go directly. */
const secure = (headers: Headers, objectStore: string): void => {
  const policy = headers.get('content-security-policy');
  // A page that gives way to another passes here twice.
  if (policy !== null && !policy.includes('connect-src')) {
    headers.set(
      'content-security-policy',
      `${policy} connect-src 'self' ${objectStore}; img-src 'self' blob:;`,
    );
  }
};

export const onRequest = sequence(wire);
