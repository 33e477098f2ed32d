import type { Actor } from '@/domain/access/permission';
import { isZone } from '@/domain/deadline/zone';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Membership } from '@/entities/people/membership';
import { Series } from '@/entities/series/series';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';

export interface NewSeries {
  readonly act: string;
  readonly id: string;
  readonly slug: string;
  readonly name: string;
  /** IANA name, `America/Chicago`. */
  readonly zone: string;
  readonly currency: string;
  readonly protestMinutes: number;
  readonly appealDays: number;
  /** In the currency's smallest unit. */
  readonly bondMinor: number;
  readonly appealsAddress: string;
}

const faultsOf = (input: NewSeries): readonly Fault[] => {
  const faults: Fault[] = [];
  const when = (bad: boolean, pointer: string, detail: string) => {
    if (bad) faults.push({ pointer, detail });
  };
  when(input.name.trim() === '' || input.name.length > 120, '/name', 'Give the series its name.');
  when(
    !/^[a-z0-9]+(-[a-z0-9]+)*$/.test(input.slug) || input.slug.length > 60,
    '/slug',
    'The address has small letters, digits and hyphens, such as corran-valley.',
  );
  when(!isZone(input.zone), '/zone', 'Give a time zone by its IANA name, such as America/Chicago.');
  when(
    !/^[A-Z]{3}$/.test(input.currency),
    '/currency',
    'Give the currency by three letters, such as USD.',
  );
  const whole = (n: number, min: number, max: number) =>
    Number.isInteger(n) && n >= min && n <= max;
  when(!whole(input.protestMinutes, 1, 43_200), '/protestMinutes', 'From 1 to 43200 minutes.');
  when(!whole(input.appealDays, 0, 90), '/appealDays', 'From 0 to 90 days.');
  when(
    !whole(input.bondMinor, 0, 100_000_000),
    '/bondMinor',
    'The bond is a sum of money, zero or more.',
  );
  return faults;
};

/** Opens a series with its ledger; the site administrator becomes its first official. */
export const createSeries = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: NewSeries,
): Promise<Result<{ readonly slug: string }, Failure>> => {
  if (!actor.siteAdmin) return fail(absent());
  const faults = faultsOf(input);
  if (faults.length > 0) return fail(invalid(faults));
  const { act: id, ...asked } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'create-series', seriesId: null, input: asked },
    async ({ em, at }) => {
      if ((await em.count(Series, { slug: input.slug })) > 0) {
        return fail(invalid([{ pointer: '/slug', detail: 'This address is taken.' }]));
      }
      em.persist(
        em.create(Series, { ...asked, bondMinor: BigInt(input.bondMinor), createdAt: at }),
      );
      await em.flush();
      em.persist(
        em.create(Membership, {
          seriesId: input.id,
          id: deps.random.uuid(),
          personId: actor.personId,
          role: 'official',
          grantedBy: actor.personId,
          since: at,
        }),
      );
      await em.flush();
      await em.execute('select append.open_ledger(?)', [input.id]);
      return ok({ slug: input.slug });
    },
  );
};
