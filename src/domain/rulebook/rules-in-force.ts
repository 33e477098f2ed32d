import { type Bulletin, findEffectiveAt } from './bulletin';
import { type Clause, sortClauses } from './clause';
import { type PlainDocument, toDocument } from './document';
import type { Edition, PenaltyRow } from './edition';
import { type Clarification, type Waiver, type Withdrawal, withdrawalsAt } from './ruling';

/** One class's published rules, and the instant for which they are asked. */
export interface RulesQuestion {
  readonly editions: readonly Edition[];
  readonly bulletins: readonly Bulletin[];
  readonly clarifications: readonly Clarification[];
  readonly waivers: readonly Waiver[];
  readonly withdrawals?: readonly Withdrawal[];
  /** Starts of the class's events: they put `next-event` bulletins in force. */
  readonly eventStartsAt: readonly string[];
  /** ISO 8601 instant in UTC. For an event, its start; for "today", now. */
  readonly at: string;
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
  /** In the tree's order. */
  readonly clauses: readonly Clause[];
  readonly penalties: readonly PenaltyRow[];
  /** Numbers of the bulletins that count, ascending. */
  readonly bulletins: readonly number[];
  readonly clarifications: readonly Clarification[];
  readonly waivers: readonly Waiver[];
  /** Numbers of the withdrawals of clarifications, ascending; absent where nothing was withdrawn. */
  readonly withdrawals?: readonly number[] | undefined;
  readonly sources: readonly ClauseSource[];
}

const byNumber = <T extends { readonly id: string; readonly number: number }>(
  rows: readonly T[],
): readonly T[] => [...rows].sort((a, b) => a.number - b.number || (a.id < b.id ? -1 : 1));

const findEdition = (editions: readonly Edition[], at: number): Edition | undefined =>
  editions
    .filter((edition) => Date.parse(edition.inForceAt) <= at)
    .sort((a, b) => Date.parse(b.inForceAt) - Date.parse(a.inForceAt) || b.number - a.number)[0];

type Standing = { readonly clause: Clause; readonly source: ClauseSource };

const apply = (standing: Map<string, Standing>, edition: number, bulletin: Bulletin): void => {
  for (const change of bulletin.changes) {
    if (change.kind === 'withdraw') {
      standing.delete(change.number);
    } else {
      const clause = change.clause;
      const source = { clause: clause.number, edition, bulletin: bulletin.number };
      standing.set(clause.number, { clause, source });
    }
  }
};

/**
 * The rules as they stand at an instant: nothing while no edition is in force. The answer depends
 * on the content and numbers of what was published, never on the order in which it is given.
 */
export const findRulesInForce = (question: RulesQuestion): RulesInForce | undefined => {
  const at = Date.parse(question.at);
  const edition = findEdition(question.editions, at);
  if (edition === undefined) return undefined;
  const bulletins = byNumber(question.bulletins).filter((bulletin) => {
    const from = findEffectiveAt(bulletin, question.eventStartsAt);
    const amends = bulletin.season === edition.season && bulletin.edition === edition.number;
    return amends && from !== undefined && from <= at;
  });
  const standing = new Map<string, Standing>(
    edition.clauses.map((clause) => [
      clause.number,
      { clause, source: { clause: clause.number, edition: edition.number } },
    ]),
  );
  for (const bulletin of bulletins) apply(standing, edition.number, bulletin);
  const clauses = sortClauses([...standing.values()].map((entry) => entry.clause));
  const withdrawn = withdrawalsAt(question.withdrawals ?? [], edition.season, at);
  const withdrawals = [...withdrawn.values()].map((row) => row.number).sort((a, b) => a - b);
  const counts = (row: { readonly season: string; readonly clause: string }) =>
    row.season === edition.season && standing.has(row.clause);
  return {
    className: edition.className,
    season: edition.season,
    edition: edition.number,
    clauses,
    penalties: edition.penalties,
    bulletins: bulletins.map((bulletin) => bulletin.number),
    clarifications: byNumber(question.clarifications).filter(
      (row) => counts(row) && Date.parse(row.publishedAt) <= at && !withdrawn.has(row.number),
    ),
    waivers: byNumber(question.waivers).filter(
      (row) => counts(row) && Date.parse(row.fromAt) <= at && at < Date.parse(row.untilAt),
    ),
    ...(withdrawals.length > 0 && { withdrawals }),
    sources: clauses.flatMap((clause) => standing.get(clause.number)?.source ?? []),
  };
};

/**
 * What is canonicalised (RFC 8785) and hashed by the caller: everything that binds, and nothing
 * of when it was asked, so that the same rules have the same hash on every day.
 */
export const rulesDocument = (rules: RulesInForce): PlainDocument =>
  toDocument({ document: 'tagwire/rules-in-force', version: '1', ...rules });
