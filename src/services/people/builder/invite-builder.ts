import { GRANT_RIGHTS, type GrantRight, RIGHT_WORDS } from '@/domain/access/helping';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { BuilderGrant } from '@/entities/paperwork/builder-grant';
import { Engine } from '@/entities/paperwork/engine';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import { newToken, tokenHash } from '../../session/token';

export const INVITATION_DAYS = 14;
const MOST_DAYS = 732;
const DAY = 86_400_000;

export interface NewGrant {
  readonly act: string;
  readonly email: string;
  /** Nothing for all engines, those added later too. */
  readonly engineIds: readonly string[] | null;
  readonly rights: readonly GrantRight[];
  /** ISO 8601 instant in UTC; the grant ends then. */
  readonly untilAt: string;
}

const faultsOf = ({ email, engineIds, rights, untilAt }: NewGrant, now: Date): readonly Fault[] => {
  const until = Date.parse(untilAt);
  const when = (wrong: boolean, field: string, detail: string): readonly Fault[] =>
    wrong ? [{ pointer: `/${field}`, detail }] : [];
  return [
    ...when(
      !/^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(email),
      'email',
      'Give an e-mail address, such as name@example.org.',
    ),
    ...when(engineIds?.length === 0, 'engines', 'Choose the engines, or all of them.'),
    ...when(rights.length === 0, 'rights', 'Choose what the builder may do.'),
    ...when(
      !(until > now.getTime()) || until > now.getTime() + MOST_DAYS * DAY,
      'until',
      'Say until when: a day to come, at most two years ahead.',
    ),
  ];
};

/**
 * Lets a builder work on the actor's own engines: on which, what, and until when. They are invited by
 * e-mail and see nothing before they take it up; it can be withdrawn at any time.
 */
export const inviteBuilder = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: NewGrant,
): Promise<Result<{ readonly grantId: string }, Failure>> => {
  if (seriesWhere(actor, 'paperwork.hand-in').length === 0) return fail(absent());
  const email = input.email.trim().toLowerCase();
  const rights = GRANT_RIGHTS.filter((right) => input.rights.includes(right));
  const asked = { ...input, email, rights };
  const faults = faultsOf(asked, deps.clock.now());
  if (faults.length > 0) return fail(invalid(faults));
  const { act: id, engineIds, untilAt } = asked;
  return performAct(
    deps,
    actor,
    { id, kind: 'invite-builder', seriesId: null, input: { email, engineIds, rights, untilAt } },
    async (act) => {
      const { em, at } = act;
      const owned =
        engineIds === null
          ? []
          : await em.find(Engine, {
              id: { $in: [...engineIds] },
              $or: [{ ownerId: actor.personId }, { holderId: actor.personId }],
            });
      if (engineIds !== null && owned.length !== new Set(engineIds).size) return fail(absent());
      const token = newToken(deps.random);
      const grantId = deps.random.uuid();
      em.persist(
        em.create(BuilderGrant, {
          id: grantId,
          competitorId: actor.personId,
          email,
          engineIds: engineIds === null ? null : [...engineIds],
          rights,
          untilAt: new Date(untilAt),
          tokenHash: tokenHash(token),
          invitedAt: at,
          expiresAt: new Date(at.getTime() + INVITATION_DAYS * DAY),
        }),
      );
      const engines =
        engineIds === null
          ? 'all of their engines'
          : `the engine${owned.length === 1 ? '' : 's'} ${owned.map(({ reference }) => reference).join(', ')}`;
      queueMail(deps, em, act, {
        seriesId: null,
        personId: null,
        address: email,
        kind: 'builder-invitation',
        subject: `${actor.name} invites you to work on their engine paperwork`,
        paragraphs: [
          `${actor.name} lets you work on the paperwork of ${engines} until ${untilAt.slice(0, 10)}:`,
          `${rights.map((right) => RIGHT_WORDS[right]).join('. ')}.`,
          `Other engines and other customers stay separate. The invitation is open for ${INVITATION_DAYS} days.`,
        ],
        next: 'look at the invitation and accept it, if you want to.',
        link: { label: 'See the invitation', path: `/invitations/builder/${token}` },
      });
      return ok({ grantId });
    },
  );
};
