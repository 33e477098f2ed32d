import type { EntityManager } from '@mikro-orm/postgresql';
import * as shapes from '@/contracts/rulebook/edition';
import { readRulesDocument } from '@/contracts/rulebook/rules-document';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import {
  findRulesInForce,
  type RulesInForce,
  type RulesQuestion,
  rulesDocument,
} from '@/domain/rulebook/rules-in-force';

export interface StandingRules {
  readonly rules: RulesInForce;
  /** Canonical JSON (RFC 8785). */
  readonly document: string;
  readonly hash: Uint8Array;
}

interface Row {
  readonly kind: 'edition' | 'bulletin' | 'clarification' | 'waiver' | 'withdrawal';
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
  const of = (kind: Row['kind']) =>
    rows.filter((row) => row.kind === kind).map((row) => row.content);
  return {
    editions: of('edition').map((content) => shapes.edition.parse(content)),
    bulletins: of('bulletin').map((content) => shapes.bulletin.parse(content)),
    clarifications: of('clarification').map((content) => shapes.clarification.parse(content)),
    waivers: of('waiver').map((content) => shapes.waiver.parse(content)),
    withdrawals: of('withdrawal').map((content) => shapes.withdrawal.parse(content)),
    eventStartsAt: starts.map((row) => new Date(row.starts_at).toISOString()),
  };
};

/** Of everything published, what is in force at an instant, with the document that is hashed. */
export const standingRules = (
  published: Omit<RulesQuestion, 'at'>,
  at: Date,
): StandingRules | undefined => {
  const rules = findRulesInForce({ ...published, at: at.toISOString() });
  if (rules === undefined) return undefined;
  const document = canonicalJson(rulesDocument(rules));
  return { rules, document, hash: sha256(utf8(document)) };
};

/** The rules of a class in force at an instant, with the document that is hashed; nothing before the first edition. */
export const findRules = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
  at: Date,
): Promise<StandingRules | undefined> =>
  standingRules(await readPublications(em, seriesId, classId), at);

/** The rules that a finding or verdict points to, back from where they are kept by their hash. */
export const getRules = async (
  em: EntityManager,
  seriesId: string,
  hash: Uint8Array,
): Promise<RulesInForce> => {
  const [row] = await em.execute<{ document: unknown }[]>(
    'select document::jsonb as document from record.rules where series_id = ? and hash = ?',
    [seriesId, Buffer.from(hash)],
  );
  const rules = readRulesDocument(row?.document);
  if (!rules.ok) throw new Error(`Rules ${toHex(hash)} cannot be read: ${rules.failure.detail}`);
  return rules.value;
};
