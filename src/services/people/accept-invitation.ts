import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Invitation } from '@/entities/people/invitation';
import { Membership } from '@/entities/people/membership';
import type { Ports } from '../ports';
import { endSession, startSession } from '../session/start-session';
import { tokenHash } from '../session/token';
import { personOfLink } from './person-of-link';

/**
 * Takes up an invitation. Holding the link proves the address, so the person is signed in by it; a
 * person not known yet is added under the name given.
 */
export const acceptInvitation = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random'>,
  input: {
    readonly token: string;
    readonly name: string;
    readonly agent: string;
    readonly previousToken: string | undefined;
  },
): Promise<Result<{ readonly token: string }, Failure>> =>
  deps.db.fork().transactional(async (em) => {
    const now = deps.clock.now();
    const hash = tokenHash(input.token);
    const open = { tokenHash: hash, acceptedAt: null, revokedAt: null, expiresAt: { $gt: now } };
    const invitation = await em.findOne(Invitation, open);
    const spent = failure('link-spent', 'This invitation was taken up already or is too old.');
    if (invitation === null) return fail(spent);
    const found = await personOfLink(deps, em, { email: invitation.email, name: input.name });
    if (!found.ok) return found;
    const person = found.value;
    if ((await em.nativeUpdate(Invitation, open, { acceptedAt: now })) !== 1) return fail(spent);
    await em.nativeUpdate(Invitation, { tokenHash: hash }, { acceptedBy: person.id });
    const { seriesId, role } = invitation;
    const held = await em.findOne(Membership, {
      seriesId,
      personId: person.id,
      role,
      endedAt: null,
    });
    if (held === null) {
      em.persist(
        em.create(Membership, {
          seriesId,
          id: deps.random.uuid(),
          personId: person.id,
          role,
          grantedBy: invitation.invitedBy,
          since: now,
        }),
      );
    }
    await endSession(deps, em, input.previousToken);
    const token = startSession(deps, em, {
      personId: person.id,
      method: 'email-link',
      agent: input.agent,
    });
    return ok({ token });
  });
