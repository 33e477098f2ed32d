import { acceptBuilderInvitation } from '@/services/people/builder/accept-builder-invitation';
import { inviteBuilder, type NewGrant } from '@/services/people/builder/invite-builder';
import { newToken, tokenHash } from '@/services/session/token';
import { BUILDER, COMPETITORS } from '../people';
import { done, type Stage } from '../stage';

/** What three customers let the builder do: sheets only, everything, and to see verdicts. */
const GRANTS: Readonly<Record<string, NewGrant['rights']>> = {
  '408': ['sheets', 'verdicts'],
  '92': ['sheets', 'answers', 'hand-in', 'verdicts'],
  '88': ['sheets'],
};

/** The builder works for three customers, each by what that one allows. */
export const writeBuilders = async (stage: Stage): Promise<void> => {
  for (const { person, carNumber, engine } of COMPETITORS) {
    const rights = GRANTS[carNumber];
    if (rights === undefined) continue;
    const { db } = stage.ports();
    const { personId } = stage.actor(person);
    const [own] = await db.execute<{ id: string }[]>(
      'select id from public.engine where owner_id = ? and reference = ?',
      [personId, engine],
    );
    const { grantId } = done(
      `let the builder work on ${engine}`,
      await inviteBuilder(stage.ports(), stage.actor(person), {
        act: stage.uuid(),
        email: BUILDER.email,
        engineIds: own === undefined ? null : [own.id],
        rights,
        untilAt: new Date(stage.nextEvent.getTime() + 200 * 86_400_000).toISOString(),
      }),
    );
    // The link went out by mail and is kept as a hash: the builder's way in is made anew.
    const token = newToken(stage.ports().random);
    await db.execute('update public.builder_grant set token_hash = ? where id = ?', [
      tokenHash(token),
      grantId,
    ]);
    done(
      `take up the work on ${engine}`,
      await acceptBuilderInvitation(stage.ports(), {
        token,
        name: BUILDER.name,
        agent: '',
        previousToken: undefined,
      }),
    );
  }
};
