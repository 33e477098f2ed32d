import type { Clause } from './clause';

export type ClauseChange =
  | { readonly kind: 'add'; readonly clause: Clause }
  | { readonly kind: 'replace'; readonly clause: Clause }
  | { readonly kind: 'withdraw'; readonly number: string };

/**
 * From when a bulletin counts.
 * - `next-event`: from the start of the first event that starts at or after its publication.
 * - `instant`: from that instant on, the instant itself included; never before its publication.
 * - `safety`: at once, from its publication.
 */
export type Effective =
  | { readonly kind: 'next-event' }
  | { readonly kind: 'instant'; readonly at: string }
  | { readonly kind: 'safety' };

/** A published bulletin. Bulletins apply by number, whatever order they were typed in. */
export interface Bulletin {
  readonly id: string;
  readonly number: number;
  /** The edition it amends: season and number. A later edition starts without it. */
  readonly season: string;
  readonly edition: number;
  readonly title: string;
  readonly reason: string;
  readonly changes: readonly ClauseChange[];
  readonly effective: Effective;
  /** ISO 8601 instant in UTC. */
  readonly publishedAt: string;
}

/**
 * The instant from which a bulletin counts, as epoch milliseconds; nothing while no coming event
 * is known. `eventStartsAt` are the class's events, in any order.
 */
export const findEffectiveAt = (
  bulletin: Pick<Bulletin, 'effective' | 'publishedAt'>,
  eventStartsAt: readonly string[],
): number | undefined => {
  const published = Date.parse(bulletin.publishedAt);
  if (bulletin.effective.kind === 'safety') return published;
  if (bulletin.effective.kind === 'instant') {
    return Math.max(published, Date.parse(bulletin.effective.at));
  }
  const coming = eventStartsAt.map((start) => Date.parse(start)).filter((at) => at >= published);
  return coming.length === 0 ? undefined : Math.min(...coming);
};
