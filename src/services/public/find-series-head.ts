import type { EntityManager } from '@mikro-orm/postgresql';
import { toHex } from '@/domain/ledger/bytes';
import { Season } from '@/entities/series/season';
import { Series } from '@/entities/series/series';
import type { Ports } from '../ports';

export interface NextEvent {
  readonly number: number;
  readonly slug: string;
  readonly name: string;
  readonly track: string;
  readonly zone: string;
  readonly startsAt: string;
}

export interface BulletinListed {
  readonly kind: 'edition' | 'bulletin' | 'clarification' | 'withdrawal';
  readonly number: number;
  readonly title: string;
  readonly className: string;
  readonly classSlug: string;
  /** Nothing while a bulletin waits for an event that is not announced. */
  readonly inForceAt: string | null;
}

/** A signed head, for the foot of a public page. */
export interface CheckpointListed {
  readonly number: number;
  readonly lines: number;
  readonly root: string;
  readonly signedAt: string;
}

export interface SeriesHead {
  readonly id: string;
  readonly slug: string;
  readonly name: string;
  readonly zone: string;
  /** The season that runs, or the one opened last. */
  readonly season: { readonly id: string; readonly name: string } | undefined;
  readonly classes: readonly { readonly name: string; readonly slug: string }[];
  readonly next: NextEvent | undefined;
  readonly checkpoint: CheckpointListed | undefined;
}

const findNext = async (em: EntityManager, seriesId: string, now: Date) => {
  const [row] = await em.execute<(NextEvent & { startsAt: Date })[]>(
    `select number, slug, name, track, zone, starts_at as "startsAt" from public.event
     where series_id = ? and ends_at >= ? order by starts_at limit 1`,
    [seriesId, now],
  );
  return row && { ...row, startsAt: new Date(row.startsAt).toISOString() };
};

const findCheckpoint = async (em: EntityManager, seriesId: string) => {
  const [row] = await em.execute<{ n: string; size: string; root: Buffer; at: Date }[]>(
    `select count(*) over () as n, size, root, signed_at as at from record.checkpoint
     where series_id = ? order by size desc limit 1`,
    [seriesId],
  );
  return (
    row && {
      number: Number(row.n),
      lines: Number(row.size),
      root: toHex(row.root),
      signedAt: new Date(row.at).toISOString(),
    }
  );
};

/** What stands on every public page of a series; nothing for an unknown address. */
export const findSeriesHead = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  slug: string,
): Promise<SeriesHead | undefined> => {
  const series = await deps.db.findOne(Series, { slug });
  if (series === null) return undefined;
  const now = deps.clock.now();
  const today = now.toISOString().slice(0, 10);
  const seasons = await deps.db.find(
    Season,
    { seriesId: series.id },
    { orderBy: { startsOn: 'desc' } },
  );
  const season =
    seasons.find(({ startsOn, endsOn }) => startsOn <= today && today <= endsOn) ?? seasons[0];
  const classes = await deps.db.execute<{ name: string; slug: string }[]>(
    'select name, slug from public.class where series_id = ? and season_id = ? order by name',
    [series.id, season?.id ?? null],
  );
  return {
    id: series.id,
    slug,
    name: series.name,
    zone: series.zone,
    season: season && { id: season.id, name: season.name },
    classes,
    next: await findNext(deps.db, series.id, now),
    checkpoint: await findCheckpoint(deps.db, series.id),
  };
};

/** What changed the rules lately: bulletins, clarifications and their withdrawals, the newest first. */
export const listBulletins = async (
  deps: Pick<Ports, 'db'>,
  seriesId: string,
  most = 6,
): Promise<readonly BulletinListed[]> => {
  const rows = await deps.db.execute<(BulletinListed & { inForceAt: Date | null })[]>(
    `select p.kind, p.number, p.title, c.name as "className", c.slug as "classSlug",
            coalesce(p.in_force_at, case when p.kind <> 'bulletin' then p.published_at else
              (select min(e.starts_at) from public.event e
               where e.series_id = c.series_id and e.season_id = c.season_id
                 and e.starts_at >= p.published_at) end) as "inForceAt"
     from record.rule_publication p
     join public.class c on c.series_id = p.series_id and c.id = p.class_id
     where p.series_id = ? and p.kind in ('bulletin', 'clarification', 'withdrawal', 'edition')
     order by p.published_at desc limit ?`,
    [seriesId, most],
  );
  return rows.map((row) => ({
    ...row,
    inForceAt: row.inForceAt === null ? null : new Date(row.inForceAt).toISOString(),
  }));
};
