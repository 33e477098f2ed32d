import type { EntityManager } from '@mikro-orm/postgresql';
import { LockMode } from '@mikro-orm/postgresql';
import { type Need, type Opening, openings } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { Paperwork } from '@/entities/paperwork/paperwork';

const condition = ({ competitorId, seriesIds, engineIds }: Opening) => ({
  competitorId,
  seriesId: { $in: [...seriesIds] },
  ...(engineIds !== undefined && { engineId: { $in: [...engineIds] } }),
});

/**
 * Paperwork on which the actor may do what is needed, by its id: their own, and what a competitor or
 * a guardian's standing opens to them; nothing otherwise.
 */
export const findOwnPaperwork = async (
  em: EntityManager,
  actor: Actor,
  id: string,
  lock = false,
  need: Need = 'answers',
): Promise<Paperwork | undefined> => {
  const open = openings(actor, need).filter(({ seriesIds }) => seriesIds.length > 0);
  if (open.length === 0) return undefined;
  const found = await em.findOne(
    Paperwork,
    { id, $or: open.map(condition) },
    lock ? { lockMode: LockMode.PESSIMISTIC_WRITE } : {},
  );
  return found ?? undefined;
};

const uuids = (ids: readonly string[]): string => `{${ids.join(',')}}`;

/** The same condition in SQL over `public.paperwork p`, with its parameters. */
export const openTo = (
  actor: Actor,
  need: Need,
): { readonly sql: string; readonly parameters: readonly unknown[] } => {
  const open = openings(actor, need);
  const one = ({ engineIds }: Opening) =>
    `(p.competitor_id = ? and p.series_id = any(?::uuid[])${engineIds === undefined ? '' : ' and p.engine_id = any(?::uuid[])'})`;
  return {
    sql: `(${open.map(one).join(' or ')})`,
    parameters: open.flatMap(({ competitorId, seriesIds, engineIds }) => [
      competitorId,
      uuids(seriesIds),
      ...(engineIds === undefined ? [] : [uuids(engineIds)]),
    ]),
  };
};
