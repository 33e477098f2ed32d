import type { Clause } from './clause';

export type ClauseChange =
  | { readonly kind: 'add'; readonly clause: Clause }
  | { readonly kind: 'replace'; readonly clause: Clause }
  | { readonly kind: 'withdraw'; readonly number: string };

/**
 * From when a bulletin counts.
 * - `next-event`: for events that start at or after its publication.
 * - `instant`: from that instant on, the instant itself included.
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
  readonly title: string;
  readonly reason: string;
  readonly changes: readonly ClauseChange[];
  readonly effective: Effective;
  /** ISO 8601 instant in UTC. */
  readonly publishedAt: string;
}
