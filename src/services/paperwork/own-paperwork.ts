import type { EntityManager } from '@mikro-orm/postgresql';
import { LockMode } from '@mikro-orm/postgresql';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { Paperwork } from '@/entities/paperwork/paperwork';

/** The actor's own paperwork by its id, in the series where they may hand in; nothing otherwise. */
export const findOwnPaperwork = async (
  em: EntityManager,
  actor: Actor,
  id: string,
  lock = false,
): Promise<Paperwork | undefined> => {
  const open = seriesWhere(actor, 'paperwork.hand-in');
  if (open.length === 0) return undefined;
  const found = await em.findOne(
    Paperwork,
    { id, seriesId: { $in: [...open] }, competitorId: actor.personId },
    lock ? { lockMode: LockMode.PESSIMISTIC_WRITE } : {},
  );
  return found ?? undefined;
};

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** Ids come in from addresses: what is no UUID names nothing. */
export const isId = (text: string): boolean => UUID.test(text);
