import type { EntityManager } from '@mikro-orm/postgresql';
import { GRANT_RIGHTS, type GrantRight, type Helping } from '@/domain/access/helping';

interface Row {
  readonly as: Helping['as'];
  readonly competitor_id: string;
  readonly name: string;
  readonly series_ids: readonly string[] | null;
  readonly engine_ids: readonly string[] | null;
  readonly rights: readonly GrantRight[] | null;
}

/**
 * Whom a person helps at an instant, and with what: builders by grants that stand, guardians by the
 * series' mark. Only series where the competitor themself may hand in count.
 */
export const findHelping = async (
  em: EntityManager,
  personId: string,
  at: Date,
): Promise<readonly Helping[]> => {
  const rows = await em.execute<Row[]>(
    `select h.as, h.competitor_id, p.name, to_jsonb(h.engine_ids) as engine_ids,
       to_jsonb(h.rights) as rights,
       (select jsonb_agg(distinct m.series_id) from public.membership m
        where m.person_id = h.competitor_id and m.ended_at is null
          and m.role in ('competitor', 'builder')
          and (h.series_id is null or m.series_id = h.series_id)) as series_ids
     from (
       select 'builder' as as, g.competitor_id, g.engine_ids, g.rights, null::uuid as series_id
       from public.builder_grant g
       where g.builder_id = ? and g.withdrawn_at is null and g.until_at > ?
       union all
       select 'guardian', w.minor_id, null, null, w.series_id
       from public.guardianship w join public.person o on o.id = ?
       where (w.guardian_id = o.id or w.guardian_email = o.email) and w.ended_at is null
     ) h join public.person p on p.id = h.competitor_id order by p.name, h.competitor_id`,
    [personId, at, personId],
  );
  return rows.map((row) => ({
    as: row.as,
    competitorId: row.competitor_id,
    competitorName: row.name,
    seriesIds: row.series_ids ?? [],
    ...(row.engine_ids === null ? {} : { engineIds: row.engine_ids }),
    rights: row.rights ?? GRANT_RIGHTS,
  }));
};
