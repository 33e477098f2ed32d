import { openings } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import type { Ports } from '../ports';
import { HOLDER } from './engine-holder';

export interface DeclarableEngine {
  readonly id: string;
  readonly reference: string;
  readonly blockCasting: string;
  readonly holderId: string;
  readonly holder: string;
}

/** Engines that the actor may begin paperwork of: held by themself, or by people who let them answer for them. */
export const listDeclarable = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly DeclarableEngine[]> => {
  const open = openings(actor, 'answers').filter(({ seriesIds }) => seriesIds.length > 0);
  if (open.length === 0) return [];
  const now = clock.now();
  const one = ({ engineIds }: { readonly engineIds?: readonly string[] | undefined }) =>
    `(h.id = ?${engineIds === undefined ? '' : ' and e.id = any(?::uuid[])'})`;
  return db.execute<DeclarableEngine[]>(
    `select e.id, e.reference, e.block_casting as "blockCasting", h.id as "holderId", h.name as holder
     from public.engine e join public.person h on h.id = ${HOLDER}
     where ${open.map(one).join(' or ')}
     order by h.id <> ?, h.name, e.reference`,
    [
      now,
      ...open.flatMap(({ competitorId, engineIds }) => [
        competitorId,
        ...(engineIds === undefined ? [] : [`{${engineIds.join(',')}}`]),
      ]),
      actor.personId,
    ],
  );
};
