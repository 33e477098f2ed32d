import type { EntityManager } from '@mikro-orm/postgresql';
import { findHex } from '@/domain/ledger/bytes';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { Deciding } from '@/domain/verdict/before-deciding';
import type { Named } from '@/domain/verdict/notice/notice-people';
import { type ReportView, readReport } from '@/domain/verdict/report-view';
import { getRules } from '../rulebook/find-rules';

/** One inspection with all that a decision on it needs; plain values. */
export interface DecisionCase {
  readonly head: CaseHead;
  readonly rules: RulesInForce;
  readonly rulesHash: string;
  readonly report: SignedReport | undefined;
  readonly signedBy: readonly string[];
  readonly takenBy: readonly string[];
  readonly names: ReadonlyMap<string, Named>;
  readonly publishedNotice: string | null;
}

export interface SignedReport {
  readonly revision: number;
  readonly hash: string;
  readonly document: ReportView;
}

export interface CaseHead {
  readonly seriesId: string;
  readonly seriesSlug: string;
  readonly seriesName: string;
  readonly currency: string;
  readonly appealDays: number;
  readonly bondMinor: string;
  readonly appealsAddress: string;
  readonly seasonId: string;
  readonly seasonSlug: string;
  readonly seasonName: string;
  readonly classId: string;
  readonly className: string;
  readonly eventNumber: number;
  readonly eventSlug: string;
  readonly eventName: string;
  readonly track: string;
  readonly zone: string;
  readonly startsAt: string;
  readonly protestMinutes: number;
  readonly inspectionId: string;
  readonly entryId: string;
  readonly state: string;
  readonly carNumber: string;
  readonly competitorId: string | null;
  readonly competitorName: string;
  readonly rulesHash: string;
}

const readHead = async (em: EntityManager, seriesId: string, inspectionId: string) => {
  const [head] = await em.execute<(CaseHead & { startsAt: Date | string })[]>(
    `select s.id as "seriesId", s.slug as "seriesSlug", s.name as "seriesName", s.currency,
            s.appeal_days as "appealDays", s.bond_minor::text as "bondMinor",
            s.appeals_address as "appealsAddress", n.id as "seasonId", n.slug as "seasonSlug",
            n.name as "seasonName", c.id as "classId", c.name as "className",
            v.number as "eventNumber", v.slug as "eventSlug", v.name as "eventName", v.track,
            v.zone, v.starts_at as "startsAt", v.protest_minutes as "protestMinutes",
            i.id as "inspectionId", i.state, e.id as "entryId", e.car_number as "carNumber",
            e.competitor_id as "competitorId", e.competitor_name as "competitorName",
            encode(i.rules_hash, 'hex') as "rulesHash"
     from public.inspection i
     join public.entry e on e.series_id = i.series_id and e.id = i.entry_id
     join public.event v on v.series_id = i.series_id and v.id = i.event_id
     join public.season n on n.series_id = i.series_id and n.id = v.season_id
     join public.class c on c.series_id = i.series_id and c.id = e.class_id
     join public.series s on s.id = i.series_id
     where i.series_id = ? and i.id = ?`,
    [seriesId, inspectionId],
  );
  return head && { ...head, startsAt: new Date(head.startsAt).toISOString() };
};

const readReports = async (em: EntityManager, seriesId: string, inspectionId: string) =>
  em.execute<
    { revision: number; hash: string; rules: string; document: string; signed_by: string }[]
  >(
    `select revision, encode(hash, 'hex') as hash, encode(rules_hash, 'hex') as rules, document, signed_by
     from record.report where series_id = ? and inspection_id = ? order by revision`,
    [seriesId, inspectionId],
  );

/** Nothing where there is no such inspection; permission has been asked before. */
export const findCase = async (
  em: EntityManager,
  seriesId: string,
  inspectionId: string,
): Promise<DecisionCase | undefined> => {
  const head = await readHead(em, seriesId, inspectionId);
  if (head === undefined) return undefined;
  const reports = await readReports(em, seriesId, inspectionId);
  const last = reports.at(-1);
  const takers = await em.execute<{ id: string }[]>(
    'select distinct taken_by as id from record.reading where series_id = ? and inspection_id = ?',
    [seriesId, inspectionId],
  );
  const view = last && readReport(last.document);
  if (view?.ok === false) throw new Error(view.failure.detail);
  const signedBy = [...new Set(reports.map((row) => row.signed_by))];
  const takenBy = takers.map((row) => row.id);
  const [published] = await em.execute<{ number: string }[]>(
    'select number from record.verdict where series_id = ? and inspection_id = ? and report_revision = ?',
    [seriesId, inspectionId, last?.revision ?? 0],
  );
  const rulesHash = last?.rules ?? head.rulesHash;
  return {
    head,
    rules: await getRules(em, seriesId, findHex(rulesHash, 32) ?? new Uint8Array()),
    rulesHash,
    report: last && view && { revision: last.revision, hash: last.hash, document: view.value },
    signedBy,
    takenBy,
    names: await readNames(em, [...signedBy, ...takenBy]),
    publishedNotice: published?.number ?? null,
  };
};

/** Names by person, with the Latin form where the person gave one. */
export const readNames = async (
  em: EntityManager,
  ids: readonly string[],
): Promise<ReadonlyMap<string, Named>> => {
  if (ids.length === 0) return new Map();
  const rows = await em.execute<{ id: string; name: string; latin: string | null }[]>(
    `select id, name, latin_name as latin from public.person where id in (${ids.map(() => '?').join(', ')})`,
    [...ids],
  );
  return new Map(
    rows.map(({ id, name, latin }) => [id, latin === null ? { name } : { name, latinName: latin }]),
  );
};

export const decidingBy = (found: DecisionCase, actorId: string): Deciding => ({
  actorId,
  signedBy: found.signedBy,
  takenBy: found.takenBy,
  competitorId: found.head.competitorId,
  reportRevision: found.report?.revision ?? null,
  publishedNotice: found.publishedNotice,
});
