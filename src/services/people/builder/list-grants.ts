import type { GrantRight } from '@/domain/access/helping';
import type { Actor } from '@/domain/access/permission';
import { isoOf } from '../../paperwork/read/read-row';
import type { Ports } from '../../ports';

export interface GrantListed {
  readonly id: string;
  readonly email: string;
  /** Nothing until it is taken up. */
  readonly builder: string | null;
  /** Names of the engines; nothing for all. */
  readonly engines: readonly string[] | null;
  readonly engineIds: readonly string[] | null;
  readonly rights: readonly GrantRight[];
  readonly untilAt: string;
}

/** What the actor lets builders do at this time, and what they are invited to. */
export const listGrants = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly GrantListed[]> => {
  const now = clock.now();
  return db.execute<GrantListed[]>(
    `select g.id, g.email, b.name as builder, to_jsonb(g.rights) as rights,
       to_jsonb(g.engine_ids) as "engineIds", ${isoOf('g.until_at')} as "untilAt",
       case when g.engine_ids is not null then (
         select jsonb_agg(e.reference order by e.reference) from public.engine e
         where e.id = any(g.engine_ids)) end as engines
     from public.builder_grant g left join public.person b on b.id = g.builder_id
     where g.competitor_id = ? and g.withdrawn_at is null and g.until_at > ?
       and (g.accepted_at is not null or g.expires_at > ?)
     order by g.accepted_at is null, b.name, g.invited_at`,
    [actor.personId, now, now],
  );
};
