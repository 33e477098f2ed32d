import type { EntityManager } from '@mikro-orm/postgresql';

/** Who is to be told of what waits for the series' officials, each once. */
export const officialsOf = (
  em: EntityManager,
  seriesId: string,
): Promise<readonly { readonly id: string; readonly email: string }[]> =>
  em.execute<{ id: string; email: string }[]>(
    `select distinct p.id, p.email from public.membership m
     join public.person p on p.id = m.person_id
     where m.series_id = ? and m.role = 'official' and m.ended_at is null
     order by p.id`,
    [seriesId],
  );
