import type { Actor, Role } from '@/domain/access/permission';
import type { RoomKey } from '@/layouts/rooms';

const ROOM: { readonly [R in Role]: readonly RoomKey[] } = {
  competitor: ['paddock'],
  builder: ['paddock'],
  inspector: ['barn', 'crib'],
  'chief-inspector': ['barn', 'crib'],
  official: ['office', 'barn', 'crib'],
  panel: ['panel'],
};

/** The rooms that stand open to this person in any series. */
export const roomsOf = (actor: Actor): readonly RoomKey[] => {
  const open = new Set(actor.standings.flatMap((standing) => ROOM[standing.role]));
  if (actor.helping !== undefined) open.add('paddock');
  if (actor.siteAdmin) open.add('office');
  return [...open];
};

/** The room a person enters after signing in. */
export const firstRoom = (actor: Actor): string => {
  const rooms = roomsOf(actor);
  const order: readonly RoomKey[] = ['office', 'barn', 'paddock', 'panel', 'crib'];
  return `/${order.find((room) => rooms.includes(room)) ?? 'paddock'}`;
};
