import type { Role } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Invitation } from '@/entities/people/invitation';
import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';
import { tokenHash } from '../session/token';

export interface InvitationSeen {
  readonly seriesId: string;
  readonly seriesName: string;
  readonly email: string;
  readonly role: Role;
}

/** What an open invitation offers, to whoever holds its link. */
export const findInvitation = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Result<InvitationSeen, Failure>> => {
  const open = await deps.db.findOne(Invitation, {
    tokenHash: tokenHash(token),
    acceptedAt: null,
    revokedAt: null,
    expiresAt: { $gt: deps.clock.now() },
  });
  if (open === null) {
    return fail(failure('link-spent', 'This invitation was taken up already or is too old.'));
  }
  const series = await deps.db.findOneOrFail(Series, { id: open.seriesId });
  return ok({
    seriesId: open.seriesId,
    seriesName: series.name,
    email: open.email,
    role: open.role,
  });
};
