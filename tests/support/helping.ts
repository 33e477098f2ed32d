import type { Actor } from '@/domain/access/permission';
import { findHelping } from '@/services/people/find-helping';
import type { World } from './world';

/** The actor as a session would know them now, with whom they may help. */
export const asNow = async (world: World, actor: Actor): Promise<Actor> => {
  const { db, clock } = world.ports();
  const { helping: _before, ...plain } = actor;
  const helping = await findHelping(db, actor.personId, clock.now());
  return helping.length === 0 ? plain : { ...plain, helping };
};

/** The link's token in the last message sent to an address. */
export const tokenMailedTo = async (world: World, address: string): Promise<string> => {
  const [mail] = await world.ports().db.execute<{ path: string }[]>(
    `select content #>> '{link,path}' as path from public.mail
       where address = ? order by created_at desc, id desc limit 1`,
    [address],
  );
  const token = mail?.path.split('/').at(-1);
  if (token === undefined) throw new Error(`No message to ${address}.`);
  return token;
};

export const emailOf = async (world: World, actor: Actor): Promise<string> => {
  const [row] = await world
    .ports()
    .db.execute<{ email: string }[]>('select email from public.person where id = ?', [
      actor.personId,
    ]);
  return row?.email ?? '';
};
