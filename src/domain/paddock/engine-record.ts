import type { SealRow } from '../inspection/custody/seals';
import type { BoreLayout } from '../tappet/layout/bore-layout';
import type { EngineFacts } from './engine-facts';

export interface OwnEngine {
  readonly id: string;
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
  readonly isOwn: boolean;
  readonly owner: string;
  /** Who has it on loan, and until when: somebody else, or the actor. */
  readonly lentTo: string | null;
  readonly heldUntil: string | null;
}

export interface TransferSeen {
  readonly id: string;
  readonly kind: 'sold' | 'lent' | 'returned';
  readonly from: string;
  readonly to: string;
  readonly untilAt: string | null;
  readonly at: string;
}

/** What the owner put right of an engine; each fact before and since. */
export interface CorrectionSeen {
  readonly id: string;
  readonly at: string;
  readonly by: string;
  readonly before: EngineFacts;
  readonly now: EngineFacts;
}

export interface AcceptedSeen {
  readonly seriesName: string;
  readonly seriesSlug: string;
  readonly className: string;
  readonly seasonName: string;
  readonly carNumber: string;
  readonly number: number;
  readonly hash: string;
  readonly rulesHash: string;
  readonly acceptedAt: string;
  readonly withdrawn: boolean;
  readonly zone: string;
}

export interface SealSeen extends SealRow {
  readonly seriesName: string;
  readonly by: string;
  readonly zone: string;
}

/** A seal's number as the competitor gave it at a swap; nobody has looked at it. */
export interface SealGiven {
  readonly id: string;
  readonly number: string;
  readonly carNumber: string;
  readonly eventName: string;
  readonly at: string;
  readonly zone: string;
}

export interface SealChecked {
  readonly place: string;
  readonly answer: string;
  readonly eventName: string;
  readonly at: string;
  readonly zone: string;
}
