import type { Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { BuilderGrant } from '@/entities/paperwork/builder-grant';
import type { Ports } from '../../ports';
import { endSession, startSession } from '../../session/start-session';
import { tokenHash } from '../../session/token';
import { personOfLink } from '../person-of-link';
import { invitationSpent } from './find-builder-invitation';

export interface LinkHolder {
  readonly token: string;
  /** For somebody who is not known yet. */
  readonly name: string;
  readonly agent: string;
  readonly previousToken: string | undefined;
}

/** Takes up a competitor's invitation: the link proves the address, so the builder is signed in by it. */
export const acceptBuilderInvitation = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random'>,
  input: LinkHolder,
): Promise<Result<{ readonly token: string; readonly personId: string }, Failure>> =>
  deps.db.fork().transactional(async (em) => {
    const now = deps.clock.now();
    const open = {
      tokenHash: tokenHash(input.token),
      acceptedAt: null,
      withdrawnAt: null,
      expiresAt: { $gt: now },
    };
    const grant = await em.findOne(BuilderGrant, open);
    if (grant === null) return fail(invitationSpent());
    const found = await personOfLink(deps, em, { email: grant.email, name: input.name });
    if (!found.ok) return found;
    const personId = found.value.id;
    const taken = await em.nativeUpdate(BuilderGrant, open, {
      acceptedAt: now,
      builderId: personId,
    });
    if (taken !== 1) return fail(invitationSpent());
    await endSession(deps, em, input.previousToken);
    const token = startSession(deps, em, { personId, method: 'email-link', agent: input.agent });
    return ok({ token, personId });
  });
