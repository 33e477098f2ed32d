import { type Actor, may, type Role } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Ports } from '../ports';

export interface PersonListed {
  readonly personId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  /** Who signs for them; nothing for those of age. */
  readonly guardian: string | null;
}

export interface InvitationListed {
  readonly email: string;
  readonly role: Role;
  readonly expiresAt: string;
}

/** Who takes part in a series, and who is invited; for those who invite. */
export const listPeople = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  seriesId: string,
): Promise<
  Result<
    { readonly people: readonly PersonListed[]; readonly invited: readonly InvitationListed[] },
    Failure
  >
> => {
  if (!may(actor, 'people.invite', seriesId)) return fail(absent());
  const people = await deps.db.execute<PersonListed[]>(
    `select p.id as "personId", p.name, p.email,
            array_agg(m.role order by m.role) as roles, w.guardian_name as guardian
     from public.membership m join public.person p on p.id = m.person_id
     left join public.guardianship w on w.series_id = m.series_id and w.minor_id = p.id
       and w.ended_at is null
     where m.series_id = ? and m.ended_at is null
     group by p.id, w.guardian_name order by p.name`,
    [seriesId],
  );
  const invited = await deps.db.execute<{ email: string; role: Role; expires_at: Date }[]>(
    `select email, role, expires_at from public.invitation
     where series_id = ? and accepted_at is null and revoked_at is null and expires_at > ?
     order by created_at desc`,
    [seriesId, deps.clock.now()],
  );
  return ok({
    people,
    invited: invited.map(({ email, role, expires_at }) => ({
      email,
      role,
      expiresAt: new Date(expires_at).toISOString(),
    })),
  });
};
