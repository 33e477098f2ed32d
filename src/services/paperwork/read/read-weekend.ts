import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { toHex } from '@/domain/ledger/bytes';
import type { OwnPaperworkRow, WeekendRow } from '@/domain/paddock/paddock-rows';
import { weekendOf } from '@/domain/paddock/weekend';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import type { ClauseResult } from '@/domain/rulebook/clause-result';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import type { Ports } from '../../ports';
import { readPublications, type StandingRules, standingRules } from '../../rulebook/find-rules';
import { checkRow } from '../check-paperwork';
import { listOwnPaperwork, listOwnVerdicts } from './list-own-paperwork';
import { readPaperwork, readVersions } from './read-row';
import { getVersionDocument } from './version-document';

type FindStanding = (row: OwnPaperworkRow, at: Date) => Promise<StandingRules | undefined>;

/** One read of a class's publications, however many cars run in it. */
const standingOnce = (em: EntityManager): FindStanding => {
  const known = new Map<string, ReturnType<typeof readPublications>>();
  return async ({ seriesId, classId }, at) => {
    const published = known.get(classId) ?? readPublications(em, seriesId, classId);
    known.set(classId, published);
    return standingRules(await published, at);
  };
};

/** The clauses as what was handed in last, or else the draft, stands to them at an instant. */
const resultsAt = async (
  em: EntityManager,
  row: OwnPaperworkRow,
  standing: StandingRules | undefined,
  now: Date,
): Promise<{ readonly results: readonly ClauseResult[]; readonly rulesChanged: boolean }> => {
  const { seriesId, id, versions, carNumber, engineId, state } = row;
  if (standing === undefined || state === 'withdrawn') return { results: [], rulesChanged: false };
  if (state === 'draft' || state === 'returned') {
    const [found] = await readPaperwork(em, 'p.series_id = ? and p.id = ?', [seriesId, id]);
    const checked = found && (await checkRow(em, found, now));
    return { results: checked?.results ?? [], rulesChanged: false };
  }
  const [last] = await readVersions(em, seriesId, id);
  const document = await getVersionDocument(em, seriesId, id, versions);
  const results = evaluateRules(standing.rules, declaredFacts(document, standing.rules), {
    carNumber,
    engineId,
  });
  return { results, rulesChanged: last?.rulesHash !== toHex(standing.hash) };
};

const numbers = (results: readonly ClauseResult[], wanted: (one: ClauseResult) => boolean) =>
  results.filter(wanted).map(({ clause }) => clause);

/**
 * Every car of the actor's own and of those who open theirs: whether anything stands against it by the
 * rules in force when the next event starts, and what to do next; what needs doing comes first.
 */
export const readWeekend = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly WeekendRow[]> => {
  const now = deps.clock.now();
  const findStanding = standingOnce(deps.db);
  // The newest first: what was decided last on an engine is what stands.
  const verdicts = await listOwnVerdicts(deps, actor);
  const breachOn = ({ engineId, competitorId, updatedAt }: OwnPaperworkRow) => {
    const last = verdicts.find(
      (one) => one.engineId === engineId && one.competitorId === competitorId,
    );
    return last?.decision === 'breach'
      ? { notice: last.number, answered: updatedAt > last.publishedAt }
      : undefined;
  };
  const rows: WeekendRow[] = [];
  for (const row of await listOwnPaperwork(deps, actor)) {
    const at = row.dueAt === null ? now : new Date(row.dueAt);
    const standing = await findStanding(row, at);
    const { results, rulesChanged } = await resultsAt(deps.db, row, standing, now);
    const waived = numbers(results, ({ state }) => state === 'waived');
    const facts = {
      state: row.state,
      remarks: row.remarks,
      breaches: numbers(results, ({ pass }) => pass === false),
      warnings: numbers(
        results,
        ({ advisory, state }) => advisory && (state === 'outside' || state === 'does-not-comply'),
      ),
      waived,
      rulesChanged,
      breach: breachOn(row),
    };
    rows.push({ ...row, ...weekendOf(facts), waived });
  }
  return rows;
};
