import type { GrantRight } from '@/domain/access/helping';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { BuilderGrant } from '@/entities/paperwork/builder-grant';
import { Engine } from '@/entities/paperwork/engine';
import { Person } from '@/entities/people/person';
import type { Ports } from '../../ports';
import { tokenHash } from '../../session/token';

export interface BuilderInvitation {
  readonly competitor: string;
  readonly email: string;
  /** Nothing for all of them. */
  readonly engines: readonly string[] | undefined;
  readonly rights: readonly GrantRight[];
  readonly untilAt: string;
  /** Whether the address is somebody's here already. */
  readonly known: boolean;
}

export const invitationSpent = (): Failure =>
  failure('link-spent', 'This invitation was taken up, withdrawn, or is too old.');

/** What a builder is invited to, for whoever holds the link. */
export const findBuilderInvitation = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Result<BuilderInvitation, Failure>> => {
  const grant = await db.findOne(BuilderGrant, {
    tokenHash: tokenHash(token),
    acceptedAt: null,
    withdrawnAt: null,
    expiresAt: { $gt: clock.now() },
  });
  if (grant === null) return fail(invitationSpent());
  const competitor = await db.findOneOrFail(Person, { id: grant.competitorId });
  const engines = grant.engineIds
    ? await db.find(Engine, { id: { $in: grant.engineIds } }, { orderBy: { reference: 'asc' } })
    : undefined;
  return ok({
    competitor: competitor.name,
    email: grant.email,
    engines: engines?.map(({ reference }) => reference),
    rights: grant.rights,
    untilAt: grant.untilAt.toISOString(),
    known: (await db.count(Person, { email: grant.email })) > 0,
  });
};
