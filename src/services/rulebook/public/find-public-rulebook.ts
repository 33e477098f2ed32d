import type { RulesQuestion } from '@/domain/rulebook/rules-in-force';
import type { Ports } from '../../ports';
import type { ClassNamed } from '../find-rulebook';
import { listPublications, type PublicationListed, withKnownInstants } from '../find-rulebook';
import { readPublications, type StandingRules, standingRules } from '../find-rules';

export interface PublicRulebook extends ClassNamed {
  readonly seasonSlug: string;
  readonly at: Date;
  /** Nothing where no edition was in force. */
  readonly standing: StandingRules | undefined;
  readonly published: Omit<RulesQuestion, 'at'>;
  readonly publications: readonly PublicationListed[];
  /** Other seasons with a class of this name, newest first. */
  readonly seasons: readonly { readonly slug: string; readonly name: string }[];
}

type Row = ClassNamed & { readonly seasonSlug: string; readonly since: Date | null };

/** The instant, or how to find it once the series' zone is known: nothing if it was not understood. */
export type Moment = (zone: string) => Date | undefined;

/**
 * What everybody may read of a class's rules at an instant. A class of one name in several seasons is
 * the one whose edition came into force last by then, unless a season is asked for.
 */
export const findPublicRulebook = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  asked: {
    readonly series: string;
    readonly raceClass: string;
    readonly season?: string | undefined;
    readonly on?: Moment | undefined;
  },
): Promise<PublicRulebook | undefined> => {
  const now = deps.clock.now();
  const [series] = await deps.db.execute<{ zone: string }[]>(
    'select zone from public.series where slug = ?',
    [asked.series],
  );
  if (series === undefined) return undefined;
  const at = asked.on?.(series.zone) ?? now;
  const rows = await deps.db.execute<Row[]>(
    `select c.series_id as "seriesId", r.slug as "seriesSlug", r.name as "seriesName", r.zone,
       s.name as "seasonName", s.slug as "seasonSlug",
       c.id as "classId", c.slug as "classSlug", c.name as "className",
       (select max(p.in_force_at) from record.rule_publication p
        where p.series_id = c.series_id and p.class_id = c.id and p.kind = 'edition'
          and p.in_force_at <= ?) as since
     from public.class c
     join public.season s on s.series_id = c.series_id and s.id = c.season_id
     join public.series r on r.id = c.series_id
     where r.slug = ? and c.slug = ?
     order by since desc nulls last, s.starts_on desc`,
    [at, asked.series, asked.raceClass],
  );
  const found =
    asked.season === undefined ? rows[0] : rows.find((row) => row.seasonSlug === asked.season);
  if (found === undefined) return undefined;
  const { since: _since, ...named } = found;
  const published = await readPublications(deps.db, named.seriesId, named.classId);
  return {
    ...named,
    at,
    standing: standingRules(published, at),
    published,
    publications: withKnownInstants(
      await listPublications(deps, named.seriesId, named.classId),
      published,
    ),
    seasons: rows.map((row) => ({ slug: row.seasonSlug, name: row.seasonName })),
  };
};
