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
import { standingSince } from '@/domain/rulebook/standing-since';
import { Kept } from './kept';

export interface StandingRules {
  readonly rules: RulesInForce;
  /** Canonical JSON (RFC 8785). */
  readonly document: string;
  readonly hash: Uint8Array;
  /** The instant from which they stand unchanged; ISO 8601 in UTC. */
  readonly since: string;
}

interface Row {
  readonly kind: 'edition' | 'bulletin' | 'clarification' | 'waiver' | 'withdrawal';
  readonly content: unknown;
}

export type Published = Omit<RulesQuestion, 'at'>;

const publishedBefore = new Kept<Published>(200);

/** Tells two states of a class's publications and events apart: the hashes of all documents, every start. */
const stateOf = async (em: EntityManager, seriesId: string, classId: string): Promise<string> => {
  const [state] = await em.execute<{ published: string | null; starts: string | null }[]>(
    `select
       (select string_agg(encode(hash, 'hex'), '' order by kind, number)
        from record.rule_publication where series_id = ? and class_id = ?) as published,
       (select string_agg(e.starts_at::text, ' ' order by e.starts_at)
        from public.event e
        join public.class c on c.series_id = e.series_id and c.season_id = e.season_id
        where e.series_id = ? and c.id = ?) as starts`,
    [seriesId, classId, seriesId, classId],
  );
  return `${seriesId} ${classId} ${toHex(sha256(utf8(JSON.stringify(state))))}`;
};

/**
 * Everything published for a class, as the domain asks for it. What was read once is not read again
 * while nothing was published since and no event moved.
 */
export const readPublications = async (
  em: EntityManager,
  seriesId: string,
  classId: string,
): Promise<Published> => {
  const state = await stateOf(em, seriesId, classId);
  const before = publishedBefore.find(state);
  if (before !== undefined) return before;
  const published = await read(em, seriesId, classId);
  // Something may have been published between the two.
  return state === (await stateOf(em, seriesId, classId))
    ? publishedBefore.keep(state, published)
    : published;
};

const read = async (em: EntityManager, seriesId: string, classId: string): Promise<Published> => {
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

const standingBefore = new WeakMap<Published, Kept<StandingRules>>();

/** Of everything published, what is in force at an instant, with the document that is hashed. */
export const standingRules = (published: Published, at: Date): StandingRules | undefined => {
  const question = { ...published, at: at.toISOString() };
  const since = standingSince(question);
  if (since === undefined) return undefined;
  const known = standingBefore.get(published) ?? new Kept<StandingRules>(8);
  standingBefore.set(published, known);
  // Between two changes the rules are the same, whenever they are asked.
  const key = String(since);
  const found = known.find(key) ?? hashed(findRulesInForce(question), since);
  return found && known.keep(key, found);
};

const hashed = (rules: RulesInForce | undefined, since: number): StandingRules | undefined => {
  if (rules === undefined) return undefined;
  const document = canonicalJson(rulesDocument(rules));
  return { rules, document, hash: sha256(utf8(document)), since: new Date(since).toISOString() };
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
