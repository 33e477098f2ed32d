import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Bulletin } from '@/domain/rulebook/bulletin';
import type { Edition } from '@/domain/rulebook/edition';
import {
  findRulesInForce,
  type RulesInForce,
  type RulesQuestion,
  rulesDocument,
} from '@/domain/rulebook/rules-in-force';
import type { Clarification, Waiver } from '@/domain/rulebook/ruling';

export interface StandingRules {
  readonly rules: RulesInForce;
  /** Canonical JSON (RFC 8785). */
  readonly document: string;
  readonly hash: Uint8Array;
}

interface Row {
  readonly kind: 'edition' | 'bulletin' | 'clarification' | 'waiver';
  readonly content: unknown;
}

/** Everything published for a class, as the domain asks for it. */
export const readPublications = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
): Promise<Omit<RulesQuestion, 'at'>> => {
  const rows = await em.execute<Row[]>(
    `select kind, document::jsonb -> 'content' as content from record.rule_publication
     where series_id = ? and class_id = ? order by kind, number`,
    [seriesId, classId],
  );
  const starts = await em.execute<{ starts_at: Date }[]>(
    `select e.starts_at from public.event e
     join public.class c on c.series_id = e.series_id and c.season_id = e.season_id
     where e.series_id = ? and c.id = ? order by e.starts_at`,
    [seriesId, classId],
  );
  const of = <T>(kind: Row['kind']): readonly T[] =>
    rows.filter((row) => row.kind === kind).map((row) => row.content as T);
  return {
    editions: of<Edition>('edition'),
    bulletins: of<Bulletin>('bulletin'),
    clarifications: of<Clarification>('clarification'),
    waivers: of<Waiver>('waiver'),
    eventStartsAt: starts.map((row) => new Date(row.starts_at).toISOString()),
  };
};

/** The rules of a class in force at an instant, with the document that is hashed; nothing before the first edition. */
export const findRules = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
  at: Date,
): Promise<StandingRules | undefined> => {
  const published = await readPublications(em, seriesId, classId);
  const rules = findRulesInForce({ ...published, at: at.toISOString() });
  if (rules === undefined) return undefined;
  const document = canonicalJson(rulesDocument(rules));
  return { rules, document, hash: sha256(utf8(document)) };
};
