import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Mail } from '@/entities/people/mail';
import { Session } from '@/entities/people/session';
import { acceptInvitation } from '@/services/people/accept-invitation';
import { invitePerson } from '@/services/people/invite-person';
import type { IdentityProvider, ProviderPerson } from '@/services/ports';
import { findActor } from '@/services/session/find-actor';
import { signOut } from '@/services/session/sign-out';
import { consumeSignInLink } from '@/services/sign-in/consume-sign-in-link';
import { finishProviderSignIn } from '@/services/sign-in/finish-provider-sign-in';
import { requestSignInLink } from '@/services/sign-in/request-sign-in-link';
import { addActor, addSeries, openWorld, type World } from '../../support/world';

let world: World;
let seriesId: string;
beforeAll(async () => {
  world = await openWorld();
  seriesId = await addSeries(world);
});
afterAll(() => world.close());

const identityOf = (person: ProviderPerson): IdentityProvider => ({
  begin: () => Promise.reject(new Error('not begun here')),
  finish: () => Promise.resolve(person),
});

const provided = (email: string, extra: Partial<ProviderPerson> = {}): ProviderPerson => ({
  issuer: 'http://identity.example.org',
  subject: email,
  email,
  emailVerified: true,
  name: 'Wren Halloway',
  ...extra,
});

const finish = (person: ProviderPerson, previousToken?: string) =>
  finishProviderSignIn(world.ports({ identity: identityOf(person) }), {
    code: 'c',
    verifier: 'v',
    nonce: 'n',
    agent: 'test',
    previousToken,
  });

/** The path in the newest mail to an address. */
const linkTo = async (address: string): Promise<string> => {
  const mail = await world
    .ports()
    .db.findOneOrFail(Mail, { address }, { orderBy: { createdAt: 'desc', id: 'desc' } });
  return (mail.content as { link: { path: string } }).link.path;
};

const emailOf = async (personId: string) => {
  const [row] = await world
    .ports()
    .db.execute<{ email: string }[]>('select email from public.person where id = ?', [personId]);
  return row?.email ?? '';
};

describe('signing in through the identity provider', () => {
  it('makes one person of one subject, however often they come', async () => {
    const first = await finish(provided('wren@example.org'));
    const second = await finish(provided('wren@example.org'));
    if (!first.ok || !second.ok) throw new Error('not signed in');
    const one = await findActor(world.ports(), first.value.token);
    const two = await findActor(world.ports(), second.value.token);
    expect(one?.personId).toBe(two?.personId);
    expect(one?.sessionId).not.toBe(two?.sessionId);
  });

  it('keeps only a hash of the token', async () => {
    const signedIn = await finish(provided('hash@example.org'));
    if (!signedIn.ok) throw new Error('not signed in');
    const sessions = await world.ports().db.find(Session, {});
    const kept = sessions.map((session) => Buffer.from(session.tokenHash).toString('hex'));
    expect(kept).not.toContain(signedIn.value.token);
  });

  it('takes no unverified address for a person that is known by it', async () => {
    const known = await addActor(world, 'Known Person');
    const email = await emailOf(known.personId);
    const refused = await finish(provided(email, { emailVerified: false }));
    expect(refused.ok).toBe(false);
  });

  it('ends the session that was there before', async () => {
    const first = await finish(provided('rotate@example.org'));
    if (!first.ok) throw new Error('not signed in');
    await finish(provided('rotate@example.org'), first.value.token);
    expect(await findActor(world.ports(), first.value.token)).toBeNull();
  });

  it('that the provider does not confirm fails in words', async () => {
    const identity: IdentityProvider = {
      begin: () => Promise.reject(new Error('no')),
      finish: () => Promise.reject(new Error('signature')),
    };
    const refused = await finishProviderSignIn(world.ports({ identity }), {
      code: 'c',
      verifier: 'v',
      nonce: 'n',
      agent: '',
      previousToken: undefined,
    });
    expect(refused).toMatchObject({ ok: false, failure: { name: 'link-spent' } });
  });
});

describe('signing in by a link', () => {
  it('works once, within its time, also when used twice at once', async () => {
    const actor = await addActor(world, 'Link Person');
    const email = await emailOf(actor.personId);
    const ports = world.ports();
    await requestSignInLink(ports, { act: ports.random.uuid(), email, returnTo: '/paddock' });
    const token = (await linkTo(email)).split('/').at(-1) ?? '';
    const uses = await Promise.all(
      [1, 2, 3].map(() =>
        consumeSignInLink(world.ports(), { token, agent: '', previousToken: undefined }),
      ),
    );
    expect(uses.filter((use) => use.ok)).toHaveLength(1);
    const used = uses.find((use) => use.ok);
    expect(used).toMatchObject({ value: { returnTo: '/paddock' } });
  });

  it('is too old after its minutes', async () => {
    const actor = await addActor(world, 'Late Person');
    const email = await emailOf(actor.personId);
    const ports = world.ports();
    await requestSignInLink(ports, { act: ports.random.uuid(), email, returnTo: '' });
    const token = (await linkTo(email)).split('/').at(-1) ?? '';
    world.clock.advance(21 * 60_000);
    const used = await consumeSignInLink(world.ports(), {
      token,
      agent: '',
      previousToken: undefined,
    });
    expect(used).toMatchObject({ ok: false, failure: { name: 'link-spent' } });
  });

  it('tells nobody who is known, and mails nothing to strangers', async () => {
    const ports = world.ports();
    const asked = await requestSignInLink(ports, {
      act: ports.random.uuid(),
      email: 'nobody@example.org',
      returnTo: '',
    });
    expect(asked).toEqual({ ok: true, value: null });
    expect(await ports.db.count(Mail, { address: 'nobody@example.org' })).toBe(0);
  });

  it('is mailed a handful of times at most', async () => {
    const actor = await addActor(world, 'Eager Person');
    const email = await emailOf(actor.personId);
    for (let i = 0; i < 8; i += 1) {
      const ports = world.ports();
      await requestSignInLink(ports, { act: ports.random.uuid(), email, returnTo: '' });
    }
    expect(await world.ports().db.count(Mail, { address: email })).toBe(5);
  });
});

describe('a session', () => {
  it('ends by signing out and by its time', async () => {
    const first = await finish(provided('leave@example.org'));
    const second = await finish(provided('stay@example.org'));
    if (!first.ok || !second.ok) throw new Error('not signed in');
    await signOut(world.ports(), first.value.token);
    expect(await findActor(world.ports(), first.value.token)).toBeNull();
    expect(await findActor(world.ports(), second.value.token)).not.toBeNull();
    world.clock.advance(15 * 86_400_000);
    expect(await findActor(world.ports(), second.value.token)).toBeNull();
  });
});

describe('an invitation', () => {
  it('gives its role once, to whoever holds the link', async () => {
    const official = await addActor(world, 'Ilse Törnkvist', [{ seriesId, role: 'official' }]);
    const ports = world.ports();
    const email = 'invited@example.org';
    const act = ports.random.uuid();
    const invited = await invitePerson(ports, official, {
      act,
      seriesId,
      email,
      role: 'inspector',
    });
    expect(invited.ok).toBe(true);
    const token = (await linkTo(email)).split('/').at(-1) ?? '';
    const unnamed = { token, name: ' ', agent: '', previousToken: undefined };
    const refused = await acceptInvitation(world.ports(), unnamed);
    expect(refused).toMatchObject({ ok: false, failure: { faults: [{ pointer: '/name' }] } });
    const accepted = await acceptInvitation(world.ports(), { ...unnamed, name: 'Dov Aranet' });
    if (!accepted.ok) throw new Error(accepted.failure.detail);
    const actor = await findActor(world.ports(), accepted.value.token);
    expect(actor?.standings).toEqual([{ seriesId, role: 'inspector' }]);
    expect((await acceptInvitation(world.ports(), { ...unnamed, name: 'Dov Aranet' })).ok).toBe(
      false,
    );
  });

  it('is not for somebody without that power to give', async () => {
    const inspector = await addActor(world, 'Oona Brannick', [{ seriesId, role: 'inspector' }]);
    const ports = world.ports();
    const refused = await invitePerson(ports, inspector, {
      act: ports.random.uuid(),
      seriesId,
      email: 'friend@example.org',
      role: 'official',
    });
    expect(refused).toMatchObject({ ok: false, failure: { name: 'absent' } });
  });
});
