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

/** A breach decided before, by row of the schedule and season. */
export interface EarlierBreach {
  readonly row: string;
  readonly season: string;
}

/**
 * Which step of a row comes next, from 1, and what it costs. Breaches of the season before count only
 * where the row carries over.
 */
export const penaltyFor = (
  row: PenaltyRow,
  earlier: readonly EarlierBreach[],
  season: { readonly name: string; readonly previous?: string | undefined },
): { readonly step: number; readonly words: string } => {
  const counted = earlier.filter(
    (breach) =>
      breach.row === row.row &&
      (breach.season === season.name ||
        (row.carriesOver && season.previous !== undefined && breach.season === season.previous)),
  );
  const step = counted.length + 1;
  return { step, words: row.penalties[Math.min(step, row.penalties.length) - 1] ?? '' };
};
