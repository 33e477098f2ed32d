import type { Failure } from '@/domain/failure';
import { ok, type Result } from '@/domain/result';
import { Person } from '@/entities/people/person';
import { SignInLink } from '@/entities/people/sign-in-link';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import type { Ports } from '../ports';
import { newToken, tokenHash } from '../session/token';

export const LINK_MINUTES = 20;
const MOST_LINKS = 5;

/**
 * Mails a one-time link, if the address is known. Known or not, asked for too often or not, the
 * answer is the same, so that nobody learns who takes part.
 */
export const requestSignInLink = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  input: { readonly act: string; readonly email: string; readonly returnTo: string },
): Promise<Result<null, Failure>> => {
  const email = input.email.trim().toLowerCase();
  return performAct(
    deps,
    null,
    { id: input.act, kind: 'request-sign-in-link', seriesId: null, input: { email } },
    async ({ em, at, send }) => {
      const person = await em.findOne(Person, { email });
      const recently = new Date(at.getTime() - LINK_MINUTES * 60_000);
      const asked = await em.count(SignInLink, { email, createdAt: { $gt: recently } });
      if (person === null || asked >= MOST_LINKS) return ok(null);
      const token = newToken(deps.random);
      em.persist(
        em.create(SignInLink, {
          id: deps.random.uuid(),
          tokenHash: tokenHash(token),
          email,
          returnTo: input.returnTo,
          createdAt: at,
          expiresAt: new Date(at.getTime() + LINK_MINUTES * 60_000),
        }),
      );
      queueMail(
        deps,
        em,
        { send, at },
        {
          seriesId: null,
          personId: person.id,
          address: email,
          kind: 'sign-in-link',
          subject: 'Your link to sign in',
          paragraphs: [
            `Dear ${person.name},`,
            `open this link within ${LINK_MINUTES} minutes and confirm there. It works once. If you did not ask for it, do nothing.`,
          ],
          next: 'open the link and confirm there.',
          link: { label: 'Sign in', path: `/sign-in/link/${token}` },
        },
      );
      return ok(null);
    },
  );
};
