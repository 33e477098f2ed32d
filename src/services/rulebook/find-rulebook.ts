import { type Actor, seriesWhere } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { toHex } from '@/domain/ledger/bytes';
import { findEffectiveAt } from '@/domain/rulebook/bulletin';
import type { RulesInForce, RulesQuestion } from '@/domain/rulebook/rules-in-force';
import type { Clarification, Withdrawal } from '@/domain/rulebook/ruling';
import type { Ports } from '../ports';
import { readPublications, standingRules } from './find-rules';
import type { Publication } from './publication';

export interface ClassNamed {
  readonly seriesId: string;
  readonly seriesSlug: string;
  readonly seriesName: string;
  readonly zone: string;
  readonly seasonName: string;
  readonly classId: string;
  readonly classSlug: string;
  readonly className: string;
}

export interface PublicationListed {
  readonly id: string;
  readonly kind: Publication['kind'];
  readonly number: number;
  readonly title: string;
  /** Nothing for a bulletin that waits for an event not known yet. */
  readonly inForceAt: string | null;
  readonly publishedAt: string;
}

export interface DraftListed {
  readonly id: string;
  readonly kind: 'edition' | 'bulletin';
  readonly title: string;
  readonly updatedBy: string;
  readonly updatedAt: string;
}

export interface RulebookState extends ClassNamed {
  readonly inForce: { readonly rules: RulesInForce; readonly hash: string } | undefined;
  readonly drafts: readonly DraftListed[];
  readonly publications: readonly PublicationListed[];
  readonly clarifications: readonly Clarification[];
  readonly withdrawals: readonly Withdrawal[];
  readonly openQuestions: number;
}

const CLASS = `select c.series_id as "seriesId", r.slug as "seriesSlug", r.name as "seriesName", r.zone,
  s.name as "seasonName", c.id as "classId", c.slug as "classSlug", c.name as "className"
  from public.class c
  join public.season s on s.series_id = c.series_id and s.id = c.season_id
  join public.series r on r.id = c.series_id`;

/** The class by its id, for those who write its rules. */
export const findWrittenClass = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  classId: string,
): Promise<ClassNamed | undefined> => {
  const series = seriesWhere(actor, 'rulebook.write');
  if (series.length === 0 || !isId(classId)) return undefined;
  const [row] = await deps.db.execute<ClassNamed[]>(
    `${CLASS} where c.series_id = any(?::uuid[]) and c.id = ?`,
    [`{${series.join(',')}}`, classId],
  );
  return row;
};

/** Everything published for a class, newest first. */
export const listPublications = async (
  deps: Pick<Ports, 'db'>,
  seriesId: string,
  classId: string,
): Promise<readonly PublicationListed[]> => {
  const rows = await deps.db.execute<
    (Omit<PublicationListed, 'inForceAt' | 'publishedAt'> & {
      readonly in_force_at: Date | null;
      readonly published_at: Date;
    })[]
  >(
    `select id, kind, number, title, in_force_at, published_at from record.rule_publication
     where series_id = ? and class_id = ? order by published_at desc, number desc`,
    [seriesId, classId],
  );
  return rows.map(({ in_force_at, published_at, ...row }) => ({
    ...row,
    inForceAt: in_force_at === null ? null : new Date(in_force_at).toISOString(),
    publishedAt: new Date(published_at).toISOString(),
  }));
};

/** With the instant from which a bulletin that waited for its event counts, once the event is known. */
export const withKnownInstants = (
  publications: readonly PublicationListed[],
  { bulletins, eventStartsAt }: Pick<RulesQuestion, 'bulletins' | 'eventStartsAt'>,
): readonly PublicationListed[] =>
  publications.map((one) => {
    const bulletin = bulletins.find((row) => row.id === one.id);
    const from = bulletin && findEffectiveAt(bulletin, eventStartsAt);
    return from === undefined ? one : { ...one, inForceAt: new Date(from).toISOString() };
  });

/** How a class's rulebook stands, for those who write it. */
export const findRulebook = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  classId: string,
): Promise<RulebookState | undefined> => {
  const named = await findWrittenClass(deps, actor, classId);
  if (named === undefined) return undefined;
  const { seriesId } = named;
  const drafts = await deps.db.execute<(DraftListed & { readonly updated_at: Date })[]>(
    `select d.id, d.kind, d.title, p.name as "updatedBy", d.updated_at
     from public.rulebook_draft d join public.person p on p.id = d.updated_by
     where d.series_id = ? and d.class_id = ? and d.published_at is null
     order by d.updated_at desc`,
    [seriesId, classId],
  );
  const [open] = await deps.db.execute<{ n: number }[]>(
    `select count(*)::int as n from public.rules_question
     where series_id = ? and class_id = ? and state = 'open'`,
    [seriesId, classId],
  );
  const published = await readPublications(deps.db, seriesId, classId);
  const standing = standingRules(published, deps.clock.now());
  return {
    ...named,
    inForce: standing && { rules: standing.rules, hash: toHex(standing.hash) },
    drafts: drafts.map(({ updated_at, ...row }) => ({
      ...row,
      updatedAt: new Date(updated_at).toISOString(),
    })),
    publications: withKnownInstants(await listPublications(deps, seriesId, classId), published),
    clarifications: published.clarifications,
    withdrawals: published.withdrawals ?? [],
    openQuestions: open?.n ?? 0,
  };
};
