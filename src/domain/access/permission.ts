import type { Helping } from './helping';

/** What a person may be to a series. A person may hold several. */
export type Role =
  | 'competitor'
  | 'builder'
  | 'inspector'
  | 'chief-inspector'
  | 'official'
  | 'panel';

export const ROLES: readonly Role[] = [
  'competitor',
  'builder',
  'inspector',
  'chief-inspector',
  'official',
  'panel',
];

/** What can be asked of a series as a whole; ownership of single things is asked in `policy.ts`. */
export type Permission =
  | 'series.administer'
  | 'people.invite'
  | 'rulebook.write'
  | 'rulebook.publish'
  | 'paperwork.hand-in'
  | 'paperwork.decide'
  | 'event.manage'
  | 'cars.pick'
  | 'inspection.assign'
  | 'inspection.record'
  | 'inspection.read'
  | 'custody.record'
  | 'gauge.read'
  | 'gauge.manage'
  | 'verdict.decide'
  | 'verdict.read-drafts'
  | 'case-file.read';

const HOLDERS: { readonly [P in Permission]: readonly Role[] } = {
  'series.administer': ['official'],
  'people.invite': ['official'],
  'rulebook.write': ['official'],
  'rulebook.publish': ['official'],
  'paperwork.hand-in': ['competitor', 'builder'],
  'paperwork.decide': ['official'],
  'event.manage': ['official'],
  'cars.pick': ['official'],
  'inspection.assign': ['official', 'chief-inspector'],
  'inspection.record': ['inspector', 'chief-inspector'],
  'inspection.read': ['inspector', 'chief-inspector', 'official', 'panel'],
  'custody.record': ['inspector', 'chief-inspector', 'official'],
  'gauge.read': ['inspector', 'chief-inspector', 'official', 'panel'],
  'gauge.manage': ['chief-inspector'],
  'verdict.decide': ['official'],
  'verdict.read-drafts': ['official'],
  'case-file.read': ['official', 'panel'],
};

export interface Standing {
  readonly seriesId: string;
  readonly role: Role;
}

/** The person who asks, as known from the session; `null` roles mean none anywhere. */
export interface Actor {
  readonly personId: string;
  readonly name: string;
  readonly sessionId: string;
  readonly authenticatedAt: string;
  readonly siteAdmin: boolean;
  readonly standings: readonly Standing[];
  /** Whom the actor may help, and with what: builders and guardians. */
  readonly helping?: readonly Helping[];
}

export const rolesIn = (actor: Actor, seriesId: string): readonly Role[] =>
  actor.standings.filter((s) => s.seriesId === seriesId).map((s) => s.role);

/** Whether the actor holds the permission in this series. */
export const may = (actor: Actor | null, permission: Permission, seriesId: string): boolean =>
  actor !== null && rolesIn(actor, seriesId).some((role) => HOLDERS[permission].includes(role));

/** The series in which the actor holds the permission. */
export const seriesWhere = (actor: Actor | null, permission: Permission): readonly string[] =>
  actor === null
    ? []
    : [
        ...new Set(
          actor.standings
            .filter((s) => HOLDERS[permission].includes(s.role))
            .map((s) => s.seriesId),
        ),
      ];
