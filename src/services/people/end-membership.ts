import { type Actor, may, type Role } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Membership } from '@/entities/people/membership';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

/** Ends a person's role in a series. The last official cannot be removed. */
export const endMembership = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly personId: string;
    readonly role: Role;
  },
): Promise<Result<null, Failure>> => {
  if (!may(actor, 'people.invite', input.seriesId)) return fail(absent());
  const { act: id, seriesId, personId, role } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'end-membership', seriesId, input: { personId, role } },
    async ({ em, at }) => {
      // Held in one order, so that two officials cannot remove each other at once.
      await em.execute('select 1 from public.series where id = ? for update', [seriesId]);
      const held = await em.findOne(Membership, { seriesId, personId, role, endedAt: null });
      if (held === null) return fail(absent());
      const officials = await em.count(Membership, { seriesId, role: 'official', endedAt: null });
      if (role === 'official' && officials === 1) {
        return fail(
          failure(
            'not-in-this-state',
            'A series keeps at least one official. Invite another one first.',
          ),
        );
      }
      held.endedAt = at;
      return ok(null);
    },
  );
};
