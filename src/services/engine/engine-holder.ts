import type { EntityManager } from '@mikro-orm/postgresql';
import type { Engine } from '@/entities/paperwork/engine';

/** Who declares an engine at an instant: whoever it is lent to, else its owner. */
export const holderOf = (
  { ownerId, holderId, heldUntil }: Pick<Engine, 'ownerId' | 'holderId' | 'heldUntil'>,
  at: Date,
): string => (holderId && heldUntil && heldUntil > at ? holderId : ownerId);

/** The same in SQL over `public.engine e`; takes the instant once. */
export const HOLDER = '(case when e.held_until > ? then e.holder_id else e.owner_id end)';

/** Whether this person declares the engine at an instant. */
export const holdsEngine = async (
  em: EntityManager,
  engineId: string,
  personId: string,
  at: Date,
): Promise<boolean> => {
  const [row] = await em.execute<{ holds: boolean }[]>(
    `select ${HOLDER} = ? as holds from public.engine e where e.id = ?`,
    [at, personId, engineId],
  );
  return row?.holds === true;
};
