import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Guardianship } from '@/entities/people/guardianship';
import { Membership } from '@/entities/people/membership';
import { Person } from '@/entities/people/person';
import { type ActDeps, performAct } from '../../act/perform-act';

const faultsOf = (name: string, email: string): readonly Fault[] => [
  ...(name === '' || name.length > 120
    ? [{ pointer: '/guardianName', detail: 'Give the guardian’s name.' }]
    : []),
  ...(/^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(email)
    ? []
    : [{ pointer: '/guardianEmail', detail: 'Give the guardian’s e-mail address.' }]),
];

/**
 * Marks a competitor of the series as under age, with the guardian who signs for them. No birth date is
 * asked for or kept.
 */
export const markMinor = async (
  deps: ActDeps,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly personId: string;
    readonly guardianName: string;
    readonly guardianEmail: string;
  },
): Promise<Result<{ readonly guardianshipId: string }, Failure>> => {
  const { act: id, seriesId, personId } = input;
  if (!may(actor, 'people.invite', seriesId)) return fail(absent());
  const guardianName = input.guardianName.trim();
  const guardianEmail = input.guardianEmail.trim().toLowerCase();
  const faults = faultsOf(guardianName, guardianEmail);
  if (faults.length > 0) return fail(invalid(faults));
  return performAct(
    deps,
    actor,
    { id, kind: 'mark-minor', seriesId, input: { personId, guardianName, guardianEmail } },
    async ({ em, at }) => {
      const member = await em.findOne(Membership, {
        seriesId,
        personId,
        role: 'competitor',
        endedAt: null,
      });
      const minor = member && (await em.findOne(Person, { id: personId }));
      if (!minor) return fail(absent());
      if (minor.email === guardianEmail) {
        const detail = 'The guardian needs an e-mail address of their own.';
        return fail(invalid([{ pointer: '/guardianEmail', detail }]));
      }
      if ((await em.count(Guardianship, { seriesId, minorId: personId, endedAt: null })) > 0) {
        const detail = `${minor.name} has a guardian here already. End that first.`;
        return fail(failure('not-in-this-state', detail));
      }
      const guardian = await em.findOne(Person, { email: guardianEmail });
      const guardianshipId = deps.random.uuid();
      em.persist(
        em.create(Guardianship, {
          seriesId,
          id: guardianshipId,
          minorId: personId,
          guardianName,
          guardianEmail,
          guardianId: guardian?.id ?? null,
          markedBy: actor.personId,
          since: at,
        }),
      );
      return ok({ guardianshipId });
    },
  );
};

/** Ends it: the competitor came of age, or somebody else signs from now on. */
export const endGuardianship = async (
  deps: ActDeps,
  actor: Actor,
  input: { readonly act: string; readonly seriesId: string; readonly personId: string },
): Promise<Result<null, Failure>> => {
  const { act: id, seriesId, personId } = input;
  if (!may(actor, 'people.invite', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id, kind: 'end-guardianship', seriesId, input: { personId } },
    async ({ em, at }) =>
      (await em.nativeUpdate(
        Guardianship,
        { seriesId, minorId: personId, endedAt: null },
        { endedAt: at },
      )) === 1
        ? ok(null)
        : fail(absent()),
  );
};
