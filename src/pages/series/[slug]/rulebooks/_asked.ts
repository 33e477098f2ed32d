import type { AstroGlobal } from 'astro';
import { readMoment } from '@/contracts/rulebook/moment';
import type { Ports } from '@/services/ports';
import {
  findPublicRulebook,
  type PublicRulebook,
} from '@/services/rulebook/public/find-public-rulebook';

export interface Asked {
  readonly book: PublicRulebook;
  /** Address of the class's rulebook. */
  readonly base: string;
  /** What was asked of the page, to be carried on: `?season=…&on=…`, or empty. */
  readonly query: string;
  readonly on: string;
  /** Whether `on` is no day or time. */
  readonly unread: boolean;
}

/** The rulebook that an address asks for; nothing if there is none. */
export const findAsked = async (
  ports: Ports,
  params: AstroGlobal['params'],
  url: URL,
  name = 'on',
): Promise<Asked | undefined> => {
  const on = url.searchParams.get(name)?.trim() ?? '';
  const season = url.searchParams.get('season') ?? undefined;
  let unread = false;
  const book = await findPublicRulebook(ports, {
    series: params['slug'] ?? '',
    raceClass: params['class'] ?? '',
    season,
    on: (zone) => {
      const at = on === '' ? undefined : readMoment(on, zone);
      unread = on !== '' && at === undefined;
      return at;
    },
  });
  if (book === undefined) return undefined;
  const kept = new URLSearchParams();
  if (season !== undefined) kept.set('season', season);
  if (on !== '' && !unread) kept.set(name, on);
  return {
    book,
    base: `/series/${book.seriesSlug}/rulebooks/${book.classSlug}`,
    query: kept.size === 0 ? '' : `?${kept}`,
    on,
    unread,
  };
};

/** The query under which these very rules are read for good: the season, and since when they stand. */
export const lastingQuery = ({ standing, seasonSlug }: PublicRulebook): string =>
  standing === undefined
    ? ''
    : `?${new URLSearchParams({ season: seasonSlug, on: standing.since })}`;

export const navOf = (slug: string, here: 'rulebooks' | 'board') => [
  { name: 'Notice board', href: `/series/${slug}`, current: here === 'board' },
  { name: 'Rulebooks', href: `/series/${slug}/rulebooks`, current: here === 'rulebooks' },
  { name: 'Ledger', href: `/series/${slug}/ledger` },
];
