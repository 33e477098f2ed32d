import type { Clause } from './clause';

/** A row of the penalty schedule: what the first, second and later breaches cost. */
export interface PenaltyRow {
  readonly row: string;
  readonly breach: string;
  /** In order of the breach's count; the last one holds for all later breaches. */
  readonly penalties: readonly string[];
  /** Whether earlier breaches count on into the next season. */
  readonly carriesOver: boolean;
}

/** An edition as published; it never changes afterwards. */
export interface Edition {
  readonly id: string;
  /** The class's and season's names as printed. */
  readonly className: string;
  readonly season: string;
  /** 1, 2, 3 … within class and season. */
  readonly number: number;
  readonly clauses: readonly Clause[];
  readonly penalties: readonly PenaltyRow[];
  /** ISO 8601 instant in UTC from which it is in force, the instant itself included. */
  readonly inForceAt: string;
}
