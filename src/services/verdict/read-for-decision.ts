import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { type EarlierBreach, type PenaltyRow, penaltyFor } from '@/domain/rulebook/edition';
import { beforeDeciding, type Precondition } from '@/domain/verdict/before-deciding';
import { computedStatement } from '@/domain/verdict/computed-statement';
import { type DecisionDraft, decidableClauses } from '@/domain/verdict/decision';
import type { ComputedStatement } from '@/domain/verdict/notice/notice';
import { VerdictDraft } from '@/entities/event/verdict-draft';
import { type PartKept, readPartsOf } from '../custody/read-parts';
import type { Ports } from '../ports';
import { type DecisionCase, decidingBy, findCase } from './find-case';

export interface DecisionSheet {
  readonly found: DecisionCase;
  readonly before: readonly Precondition[];
  readonly computed: ComputedStatement;
  readonly decidable: readonly string[];
  /** The schedule, each row with the step that this competitor's earlier breaches lead to. */
  readonly penalties: readonly (PenaltyRow & { readonly nextStep: number })[];
  /** Parts held from this engine, each with its chain: a gap warns, and blocks nothing. */
  readonly heldParts: readonly PartKept[];
  /** Published on an earlier revision of the report than the one that is decided on now. */
  readonly earlierNotice: string | null;
  readonly draft: { readonly version: number; readonly content: DecisionDraft } | null;
}

/** Earlier verdicts of breach on this competitor's entries in the class, before this inspection's own. */
const earlierBreaches = async (
  deps: Pick<Ports, 'db'>,
  { head }: DecisionCase,
): Promise<readonly EarlierBreach[]> =>
  deps.db.execute<EarlierBreach[]>(
    `select v.notice::jsonb #>> '{penalty,row}' as row, v.notice::jsonb ->> 'season' as season
     from record.verdict v
     join public.entry e on e.series_id = v.series_id and e.id = v.entry_id
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     where v.series_id = ? and v.decision = 'breach' and v.inspection_id <> ? and c.name = ?
       and (e.competitor_id = ? or (e.competitor_id is null and e.competitor_name = ?))`,
    [head.seriesId, head.inspectionId, head.className, head.competitorId, head.competitorName],
  );

const previousSeason = async (deps: Pick<Ports, 'db'>, { head }: DecisionCase) => {
  const [row] = await deps.db.execute<{ name: string }[]>(
    `select p.name from public.season p join public.season n on n.series_id = p.series_id
     where n.series_id = ? and n.id = ? and p.ends_on < n.starts_on order by p.ends_on desc limit 1`,
    [head.seriesId, head.seasonId],
  );
  return row?.name;
};

const findEarlierNotice = async (deps: Pick<Ports, 'db'>, { head, report }: DecisionCase) => {
  const [row] = await deps.db.execute<{ number: string }[]>(
    `select number from record.verdict where series_id = ? and inspection_id = ?
       and report_revision < ? order by report_revision desc limit 1`,
    [head.seriesId, head.inspectionId, report?.revision ?? 0],
  );
  return row?.number ?? null;
};

/** Findings beside the clauses as they were in force, with what has been written down so far. */
export const readForDecision = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  input: { readonly seriesId: string; readonly inspectionId: string },
): Promise<Result<DecisionSheet, Failure>> => {
  const { seriesId, inspectionId } = input;
  if (!may(actor, 'verdict.read-drafts', seriesId)) return fail(absent());
  const found = await findCase(deps.db, seriesId, inspectionId);
  if (found === undefined) return fail(absent());
  const draft = await deps.db.findOne(VerdictDraft, { seriesId, inspectionId });
  const findings = found.report?.document.findings ?? [];
  const earlier = await earlierBreaches(deps, found);
  const season = { name: found.head.seasonName, previous: await previousSeason(deps, found) };
  return ok({
    found,
    before: beforeDeciding(decidingBy(found, actor.personId)),
    computed: computedStatement(findings),
    decidable: decidableClauses(found.rules, findings),
    penalties: found.rules.penalties.map((row) => ({
      ...row,
      nextStep: Math.min(penaltyFor(row, earlier, season).step, row.penalties.length),
    })),
    heldParts: await readPartsOf(deps.db, seriesId, inspectionId),
    earlierNotice: await findEarlierNotice(deps, found),
    draft: draft && {
      version: draft.version,
      content: draft.content as unknown as DecisionDraft,
    },
  });
};
