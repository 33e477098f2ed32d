import { type Actor, may, type Role } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Invitation } from '@/entities/people/invitation';
import { Series } from '@/entities/series/series';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { newToken, tokenHash } from '../session/token';

const INVITATION_DAYS = 14;

export const ROLE_WORDS: { readonly [R in Role]: string } = {
  competitor: 'competitor',
  builder: 'engine builder',
  inspector: 'inspector',
  'chief-inspector': 'chief inspector',
  official: 'series official',
  panel: 'member of the appeals panel',
};

/** Invites a person to a role in a series by e-mail. */
export const invitePerson = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly email: string;
    readonly role: Role;
  },
): Promise<Result<{ readonly invitationId: string }, Failure>> => {
  if (!may(actor, 'people.invite', input.seriesId)) return fail(absent());
  const { act: id, seriesId, role } = input;
  const email = input.email.trim().toLowerCase();
  return performAct(
    deps,
    actor,
    { id, kind: 'invite-person', seriesId, input: { email, role } },
    async ({ em, at, send }) => {
      const series = await em.findOneOrFail(Series, { id: seriesId });
      const token = newToken(deps.random);
      const invitationId = deps.random.uuid();
      em.persist(
        em.create(Invitation, {
          seriesId,
          id: invitationId,
          email,
          role,
          tokenHash: tokenHash(token),
          invitedBy: actor.personId,
          createdAt: at,
          expiresAt: new Date(at.getTime() + INVITATION_DAYS * 86_400_000),
        }),
      );
      queueMail(
        deps,
        em,
        { send, at },
        {
          seriesId,
          personId: null,
          address: email,
          kind: 'invitation',
          subject: `${series.name}: you are invited as ${ROLE_WORDS[role]}`,
          paragraphs: [
            `${actor.name} invites you to take part in ${series.name} as ${ROLE_WORDS[role]}.`,
            `The invitation is open for ${INVITATION_DAYS} days.`,
          ],
          next: 'look at the invitation and take it up, if you want to.',
          link: { label: 'See the invitation', path: `/invitations/${token}` },
        },
      );
      return ok({ invitationId });
    },
  );
};
