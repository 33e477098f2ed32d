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
  '/api/events/[series]': { access: 'permission', permission: 'event.manage' },
  '/api/events/[series]/[event]/entries': { access: 'permission', permission: 'event.manage' },
  '/api/events/[series]/[event]/picks': { access: 'permission', permission: 'cars.pick' },
  '/api/events/[series]/[event]/positions': { access: 'permission', permission: 'event.manage' },
  '/api/files/[file]/confirm': { access: 'own' },
  '/api/files/[file]/original': { access: 'own' },
  '/api/files/[file]/preview/[width]': { access: 'own' },
  '/api/files/[file]/remove': { access: 'own' },
  '/api/files/[file]/sheet': { access: 'own' },
  '/api/gauges/[series]': { access: 'permission', permission: 'gauge.manage' },
  '/api/inspections/[id]/assignment': { access: 'permission', permission: 'inspection.assign' },
  '/api/inspections/[id]/captures': { access: 'permission', permission: 'inspection.record' },
  '/api/inspections/[id]/correction': { access: 'permission', permission: 'inspection.record' },
  '/api/inspections/[id]/report': { access: 'permission', permission: 'inspection.record' },
  '/api/inspections/[id]/state': { access: 'permission', permission: 'inspection.read' },
  '/api/openapi.json': open,
  '/api/paperwork/[paperwork]/check': { access: 'own' },
  '/api/paperwork/[paperwork]/decision': { access: 'permission', permission: 'paperwork.decide' },
  '/api/paperwork/[paperwork]/draft': { access: 'own' },
  '/api/paperwork/[paperwork]/files': { access: 'own' },
  '/api/paperwork/[paperwork]/hand-in': { access: 'own' },
  '/api/paperwork/[paperwork]/template/[sheet]': { access: 'own' },
  '/barn': { access: 'permission', permission: 'inspection.read' },
  '/barn/inspections/[id]': { access: 'permission', permission: 'inspection.read' },
  '/barn/inspections/[id]/measure': { access: 'permission', permission: 'inspection.read' },
  '/bench': open,
  '/bench/cam': open,
  '/bench/clearance': open,
  '/bench/compression': open,
  '/bench/decision': open,
  '/bench/displacement': open,
  '/bench/temperature': open,
  '/bench/uncertainty': open,
  '/crib': { access: 'permission', permission: 'gauge.read' },
  '/crib/[series]/[gauge]': { access: 'permission', permission: 'gauge.manage' },
  '/enter': open,
  '/invitations/[token]': open,
  '/office': { access: 'own' },
  '/office/events': { access: 'permission', permission: 'event.manage' },
  '/office/events/[event]': { access: 'permission', permission: 'event.manage' },
  '/office/events/[event]/picks': { access: 'permission', permission: 'cars.pick' },
  '/office/events/new': { access: 'permission', permission: 'event.manage' },
  '/office/paperwork': { access: 'permission', permission: 'paperwork.decide' },
  '/office/paperwork/[id]': { access: 'permission', permission: 'paperwork.decide' },
  '/office/people/[slug]': { access: 'permission', permission: 'people.invite' },
  '/office/series/[slug]': { access: 'permission', permission: 'series.administer' },
  '/office/series/new': { access: 'own' },
  '/paddock': { access: 'own' },
  '/paddock/paperwork/[id]': { access: 'own' },
  '/paddock/paperwork/[id]/review': { access: 'own' },
  '/paddock/paperwork/[id]/versions/[number]': { access: 'own' },
  '/paddock/paperwork/new': { access: 'own' },
  '/sign-in': open,
  '/sign-in/link/[token]': open,
  '/sign-in/provider': open,
  '/sign-in/return': open,
  '/sign-out': open,
};
