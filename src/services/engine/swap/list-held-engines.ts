import type { Ports } from '../../ports';
import { HOLDER } from '../engine-holder';

export interface HeldEngine {
  readonly id: string;
  readonly reference: string;
  readonly holderId: string;
}

/** Engines that these people declare at this time; asked for people whose cars the actor may swap engines of. */
export const listHeldEngines = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  holderIds: readonly string[],
): Promise<readonly HeldEngine[]> => {
  const now = clock.now();
  return db.execute<HeldEngine[]>(
    `select e.id, e.reference, ${HOLDER} as "holderId" from public.engine e
     where ${HOLDER} = any(?::uuid[]) order by e.reference`,
    [now, now, `{${[...new Set(holderIds)].join(',')}}`],
  );
};
