import type { APIRoute } from 'astro';
import { firstRoom } from '@/http/rooms';

/** After signing in: to the room this person works in. */
export const GET: APIRoute = ({ locals, redirect }) =>
  redirect(locals.actor === null ? '/sign-in' : firstRoom(locals.actor), 303);
