import type { Actor, Role } from '@/domain/access/permission';
import { findHelping } from '../people/find-helping';
import type { Ports } from '../ports';
import { tokenHash } from './token';

interface Row {
  readonly session_id: string;
  readonly person_id: string;
  readonly name: string;
  readonly site_admin: boolean;
  readonly authenticated_at: Date;
  readonly standings: readonly { readonly seriesId: string; readonly role: Role }[] | null;
}

/** Who holds this session token, with what standing; nobody if it has ended. */
export const findActor = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Actor | null> => {
  if (!/^[0-9a-f]{64}$/.test(token)) return null;
  const [row] = await deps.db.execute<Row[]>(
    `select s.id as session_id, p.id as person_id, p.name, p.site_admin, s.authenticated_at,
            (select jsonb_agg(jsonb_build_object('seriesId', m.series_id, 'role', m.role))
             from public.membership m where m.person_id = p.id and m.ended_at is null) as standings
     from public.session s join public.person p on p.id = s.person_id
     where s.token_hash = ? and s.revoked_at is null and s.expires_at > ?`,
    [tokenHash(token), deps.clock.now()],
  );
  if (row === undefined) return null;
  const helping = await findHelping(deps.db, row.person_id, deps.clock.now());
  return {
    personId: row.person_id,
    name: row.name,
    sessionId: row.session_id,
    authenticatedAt: new Date(row.authenticated_at).toISOString(),
    siteAdmin: row.site_admin,
    standings: row.standings ?? [],
    ...(helping.length > 0 && { helping }),
  };
};
