import type { Actor } from '@/domain/access/permission';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import type { Ports } from '../ports';

export interface OwnEngine {
  readonly id: string;
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
}

/** The actor's own engines by name. */
export const listEngines = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly OwnEngine[]> => {
  const rows = await deps.db.execute<
    (Omit<OwnEngine, 'blockCasting' | 'headCastings'> & {
      block_casting: string;
      head_castings: string;
    })[]
  >(
    `select id, reference, layout, block_casting, head_castings, serial
     from public.engine where owner_id = ? order by reference`,
    [actor.personId],
  );
  return rows.map(({ block_casting, head_castings, ...row }) => ({
    ...row,
    blockCasting: block_casting,
    headCastings: head_castings,
  }));
};
