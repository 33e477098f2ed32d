import type { Ports } from '../../ports';

export interface RulebookListed {
  readonly classSlug: string;
  readonly className: string;
  readonly seasonSlug: string;
  readonly seasonName: string;
  /** Editions published, whether in force yet or not. */
  readonly editions: number;
  readonly bulletins: number;
}

/** The published rulebooks of a series, newest season first; nothing if there is no such series. */
export const listRulebooks = async (
  deps: Pick<Ports, 'db'>,
  seriesSlug: string,
): Promise<
  { readonly seriesName: string; readonly rulebooks: readonly RulebookListed[] } | undefined
> => {
  const [series] = await deps.db.execute<{ id: string; name: string }[]>(
    'select id, name from public.series where slug = ?',
    [seriesSlug],
  );
  if (series === undefined) return undefined;
  const rulebooks = await deps.db.execute<RulebookListed[]>(
    `select c.slug as "classSlug", c.name as "className", s.slug as "seasonSlug",
       s.name as "seasonName",
       count(*) filter (where p.kind = 'edition')::int as editions,
       count(*) filter (where p.kind = 'bulletin')::int as bulletins
     from public.class c
     join public.season s on s.series_id = c.series_id and s.id = c.season_id
     join record.rule_publication p on p.series_id = c.series_id and p.class_id = c.id
     where c.series_id = ?
     group by c.series_id, c.id, s.series_id, s.id
     order by s.starts_on desc, c.name`,
    [series.id],
  );
  return { seriesName: series.name, rulebooks };
};
