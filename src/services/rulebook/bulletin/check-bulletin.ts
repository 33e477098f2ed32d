import type { EntityManager } from '@mikro-orm/postgresql';
import type { BulletinContent } from '@/contracts/rulebook/read-rulebook';
import type { Fault } from '@/domain/failure';
import { findBulletinFaults, withChanges } from '@/domain/rulebook/ambiguity/bulletin-faults';
import { findEffectiveAt } from '@/domain/rulebook/bulletin';
import { findRulesInForce, type RulesInForce } from '@/domain/rulebook/rules-in-force';
import { type Trial, tryRules } from '@/domain/rulebook/trial/try-rules';
import { readPublications } from '../find-rules';
import { type AcceptedEngine, readAcceptedEngines } from './past-cases';

export interface BulletinChecked {
  /** The rules that the bulletin amends: those in force when it would begin to count. */
  readonly before: RulesInForce;
  /** Nothing while no coming event is known. */
  readonly countsFrom: string | undefined;
  readonly faults: readonly Fault[];
  /** Accepted engines it would make illegal; nothing while there are faults. */
  readonly trial: Trial | undefined;
  readonly affected: readonly AcceptedEngine[];
}

export type Amended = Pick<BulletinChecked, 'before' | 'countsFrom'>;

/** The rules that a bulletin amends if published now; nothing without an edition to amend. */
export const findAmended = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
  content: Pick<BulletinContent, 'effective'>,
  at: Date,
): Promise<Amended | undefined> => {
  const published = await readPublications(em, seriesId, classId);
  const publishedAt = at.toISOString();
  const { effective } = content;
  const from = findEffectiveAt({ effective, publishedAt }, published.eventStartsAt);
  const countsFrom = from === undefined ? undefined : new Date(from).toISOString();
  const before = findRulesInForce({ ...published, at: countsFrom ?? publishedAt });
  return before && { before, countsFrom };
};

/** A bulletin held against the rules it amends and the accepted engines, as if published now. */
export const checkBulletin = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
  content: BulletinContent,
  at: Date,
): Promise<BulletinChecked | undefined> => {
  const amended = await findAmended(em, seriesId, classId, content, at);
  if (amended === undefined) return undefined;
  const { before } = amended;
  const faults = findBulletinFaults(content, before, at.toISOString());
  if (faults.length > 0) return { ...amended, faults, trial: undefined, affected: [] };
  const engines = await readAcceptedEngines(em, seriesId, [classId]);
  const after = { ...before, clauses: withChanges(before.clauses, content.changes) };
  const trial = tryRules(after, engines, before);
  const failing = new Set(trial.failed.map((one) => one.id));
  return { ...amended, faults, trial, affected: engines.filter((e) => failing.has(e.id)) };
};
