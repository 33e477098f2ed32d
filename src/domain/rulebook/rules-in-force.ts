import type { Bulletin } from './bulletin';
import type { Clause } from './clause';
import type { Edition, PenaltyRow } from './edition';
import type { Clarification, Waiver } from './ruling';

export interface RulesQuestion {
  readonly editions: readonly Edition[];
  readonly bulletins: readonly Bulletin[];
  readonly clarifications: readonly Clarification[];
  readonly waivers: readonly Waiver[];
  /** ISO 8601 instant in UTC for which the rules are asked. */
  readonly at: string;
  /** Start of the event the question is about; without it `next-event` bulletins wait. */
  readonly eventStartAt?: string | undefined;
}

/** Where a clause in force has its words from. */
export interface ClauseSource {
  readonly clause: string;
  readonly edition: number;
  readonly bulletin?: number | undefined;
}

export interface RulesInForce {
  readonly className: string;
  readonly season: string;
  readonly edition: number;
  readonly clauses: readonly Clause[];
  readonly penalties: readonly PenaltyRow[];
  readonly bulletins: readonly number[];
  readonly clarifications: readonly Clarification[];
  readonly waivers: readonly Waiver[];
  readonly sources: readonly ClauseSource[];
}
