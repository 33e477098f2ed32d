import type { Actor } from '@/domain/access/permission';
import type { OwnEngine } from '@/domain/paddock/engine-record';
import { isoOf } from '../paperwork/read/read-row';
import type { Ports } from '../ports';

/** The actor's own engines, lent out or not, and those lent to them, by name. */
export const listEngines = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly OwnEngine[]> => {
  const now = deps.clock.now();
  const rows = await deps.db.execute<
    (Omit<OwnEngine, 'blockCasting' | 'headCastings'> & {
      block_casting: string;
      head_castings: string;
    })[]
  >(
    `select e.id, e.reference, e.layout, e.block_casting, e.head_castings, e.serial, o.name as owner,
       e.owner_id = ? as "isOwn", h.name as "lentTo", ${isoOf('e.held_until')} as "heldUntil"
     from public.engine e join public.person o on o.id = e.owner_id
     left join public.person h on h.id = e.holder_id and e.held_until > ?
     where e.owner_id = ? or (e.holder_id = ? and e.held_until > ?) order by e.reference`,
    [actor.personId, now, actor.personId, actor.personId, now],
  );
  return rows.map(({ block_casting, head_castings, ...row }) => ({
    ...row,
    blockCasting: block_casting,
    headCastings: head_castings,
  }));
};
