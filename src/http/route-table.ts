import type { Permission } from '@/domain/access/permission';

/**
 * Who may reach each route. `own`: what is shown depends on whose it is, and a stranger gets the
 * answer of an unknown thing. A route that is not listed here fails the authorisation test.
 */
export type RouteAccess =
  | { readonly access: 'public' }
  | { readonly access: 'signed-in' }
  | { readonly access: 'own' }
  | { readonly access: 'permission'; readonly permission: Permission };

const open: RouteAccess = { access: 'public' };

/** Keys are the routes as files name them, `/invitations/[token]`. */
export const ROUTES: Readonly<Record<string, RouteAccess>> = {
  '/': open,
  '/404': open,
  '/500': open,
  '/api/bench/assess': open,
  '/api/bench/clearance': open,
  '/api/bench/engine': open,
  '/api/bench/study': open,
  '/api/bench/temperature': open,
  '/api/bench/uncertainty': open,
  '/api/openapi.json': open,
  '/bench': open,
  '/bench/cam': open,
  '/bench/clearance': open,
  '/bench/compression': open,
  '/bench/decision': open,
  '/bench/displacement': open,
  '/bench/temperature': open,
  '/bench/uncertainty': open,
  '/enter': open,
  '/invitations/[token]': open,
  '/office': { access: 'own' },
  '/office/people/[slug]': { access: 'permission', permission: 'people.invite' },
  '/office/series/[slug]': { access: 'permission', permission: 'series.administer' },
  '/office/series/new': { access: 'own' },
  '/sign-in': open,
  '/sign-in/link/[token]': open,
  '/sign-in/provider': open,
  '/sign-in/return': open,
  '/sign-out': open,
};
