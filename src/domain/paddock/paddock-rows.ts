import type { PaperworkState } from '../paperwork/state';
import type { Weekend } from './weekend';

export interface OwnPaperworkRow {
  readonly id: string;
  readonly competitorId: string;
  /** Whose it is: the actor's own, or a customer's. */
  readonly competitorName: string;
  readonly seriesId: string;
  readonly engineId: string;
  readonly classId: string;
  readonly seriesName: string;
  readonly className: string;
  readonly seasonName: string;
  readonly carNumber: string;
  readonly reference: string;
  readonly state: PaperworkState;
  readonly versions: number;
  readonly updatedAt: string;
  readonly zone: string;
  /** Remarks on the version last decided. */
  readonly remarks: number;
  /** The next event of the season that has not begun; nothing while none is set. */
  readonly dueAt: string | null;
  readonly dueEvent: string | null;
}

export interface WeekendRow extends OwnPaperworkRow, Weekend {
  /** Clauses whose waiver counts for this car or engine at the event. */
  readonly waived: readonly string[];
}

export interface OwnVerdictRow {
  readonly number: string;
  readonly seriesSlug: string;
  readonly competitorId: string;
  /** Nothing where no accepted paperwork stood behind the inspection. */
  readonly engineId: string | null;
  readonly eventId: string;
  readonly carNumber: string;
  readonly eventName: string;
  readonly decision: 'breach' | 'no-breach';
  readonly publishedAt: string;
  readonly provisionalUntil: string;
  readonly zone: string;
}

export interface SwapListed {
  readonly id: string;
  readonly eventName: string;
  readonly carNumber: string;
  readonly competitorName: string;
  readonly from: string;
  readonly to: string;
  readonly seal: string;
  readonly paperworkId: string;
  /** `not-in-yet` until its bytes are here; `another` where they are not those that were announced. */
  readonly photograph: 'kept' | 'not-in-yet' | 'another';
  readonly photographId: string;
  /** When its bytes arrived; nothing until then. */
  readonly photographAt: string | null;
  readonly paperwork: PaperworkState;
  /** Whether the rest has been handed in. */
  readonly handedIn: boolean;
  readonly dueAt: string;
  readonly swappedAt: string;
  readonly zone: string;
}
