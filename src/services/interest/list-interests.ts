import type { InterestKind } from '@/domain/access/interest-kind';
import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import type { Ports } from '../ports';

export interface InterestListed {
  readonly id: string;
  readonly seriesId: string;
  readonly series: string;
  readonly personId: string;
  readonly person: string;
  readonly kind: InterestKind;
  readonly competitor: string | null;
  readonly carNumber: string | null;
  readonly words: string;
  readonly declaredBy: string;
  readonly declaredAt: string;
}

export interface InterestsOfSeries {
  readonly id: string;
  readonly name: string;
  readonly zone: string;
  /** Whether this person declares for others and ends interests. */
  readonly keeps: boolean;
  readonly inspectors: readonly { readonly id: string; readonly name: string }[];
  readonly competitors: readonly { readonly id: string; readonly name: string }[];
  readonly interests: readonly InterestListed[];
}

/** Interests that stand, in each series where the actor reads inspections. */
export const listInterests = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
): Promise<readonly InterestsOfSeries[]> => {
  const ids = [...seriesWhere(actor, 'inspection.read')];
  if (ids.length === 0) return [];
  const marks = ids.map(() => '?').join(', ');
  const series = await deps.db.execute<{ id: string; name: string; zone: string }[]>(
    `select id, name, zone from public.series where id in (${marks}) order by name`,
    ids,
  );
  const people = await deps.db.execute<
    { seriesId: string; id: string; name: string; inspects: boolean; competes: boolean }[]
  >(
    `select m.series_id as "seriesId", p.id, p.name,
            bool_or(m.role in ('inspector', 'chief-inspector')) as inspects,
            bool_or(m.role in ('competitor', 'builder')) as competes
     from public.membership m join public.person p on p.id = m.person_id
     where m.series_id in (${marks}) and m.ended_at is null
     group by m.series_id, p.id, p.name order by p.name`,
    ids,
  );
  const interests = await deps.db.execute<InterestListed[]>(
    `select n.id, n.series_id as "seriesId", s.name as series, n.person_id as "personId", p.name as person,
            n.kind, c.name as competitor, n.car_number as "carNumber", n.words, d.name as "declaredBy",
            to_char(n.declared_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as "declaredAt"
     from public.interest n join public.series s on s.id = n.series_id
     join public.person p on p.id = n.person_id join public.person d on d.id = n.declared_by
     left join public.person c on c.id = n.competitor_id
     where n.series_id in (${marks}) and n.ended_at is null order by p.name, n.declared_at`,
    ids,
  );
  return series.map((one) => {
    const here = people.filter((person) => person.seriesId === one.id);
    const named = (list: typeof here) => list.map(({ id, name }) => ({ id, name }));
    return {
      ...one,
      keeps: may(actor, 'inspection.assign', one.id),
      inspectors: named(here.filter(({ inspects }) => inspects)),
      competitors: named(here.filter(({ competes }) => competes)),
      interests: interests.filter((row) => row.seriesId === one.id),
    };
  });
};
