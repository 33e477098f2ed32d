import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import type { Written } from '@/domain/quantity/dimension';
import { fail, ok, type Result } from '@/domain/result';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { Event } from '@/entities/event/event';
import { GaugeRow } from '@/entities/event/gauge';
import { Series } from '@/entities/series/series';
import { findInspectionRow } from '../inspection/read/find-inspection';
import { type RegisteredGauge, registered } from '../inspection/read/inspection-file';
import type { Ports } from '../ports';
import { getRules } from '../rulebook/find-rules';

/** What a check of a gauge can be made against. */
export interface CheckSetting {
  readonly gauge: RegisteredGauge;
  readonly rings: readonly RegisteredGauge[];
  readonly events: readonly { readonly id: string; readonly name: string }[];
  readonly eventId: string | null;
  readonly inspectionId: string | null;
  readonly zone: string;
  /** What the class allows where one of its clauses says so; else the gauge's division. */
  readonly allowed: Written | undefined;
  readonly allowedBecause: string;
}

const ringCheckOf = (rules: RulesInForce): { clause: string; allowed: Written } | undefined => {
  for (const { number, requirement } of rules.clauses) {
    if (requirement === undefined || !('decisionRule' in requirement)) continue;
    if (requirement.ringCheck !== undefined)
      return { clause: number, allowed: requirement.ringCheck };
  }
  return undefined;
};

const WEEK = 7 * 24 * 3_600_000;

/** For who may record in the bay: the gauge, the rings, and the night's event. */
export const findCheckSetting = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly seriesId: string;
    readonly gaugeId: string;
    readonly inspectionId: string | null;
  },
): Promise<Result<CheckSetting, Failure>> => {
  const { seriesId, gaugeId } = input;
  const { db } = deps;
  if (!may(actor, 'inspection.record', seriesId) || !isId(gaugeId)) return fail(absent());
  const row = await db.findOne(GaugeRow, { seriesId, id: gaugeId });
  if (row === null) return fail(absent());
  const inspection =
    input.inspectionId === null
      ? null
      : await findInspectionRow(db, actor, 'inspection.record', input.inspectionId);
  const rules = inspection && (await getRules(db, seriesId, inspection.rulesHash));
  const others = (await db.find(GaugeRow, { seriesId }, { orderBy: { code: 'asc' } })).map(
    registered,
  );
  const now = deps.clock.now().getTime();
  const events = await db.find(Event, { seriesId }, { orderBy: { startsAt: 'desc' }, limit: 30 });
  const away = (event: Event): number =>
    Math.max(event.startsAt.getTime() - now, now - event.endsAt.getTime(), 0);
  const [tonight] = [...events]
    .filter((event) => away(event) < WEEK)
    .sort((a, b) => away(a) - away(b));
  const eventId = inspection?.eventId ?? tonight?.id ?? null;
  const zone =
    events.find(({ id }) => id === eventId)?.zone ??
    (await db.findOneOrFail(Series, { id: seriesId })).zone;
  const said = rules && ringCheckOf(rules);
  const gauge = registered(row);
  return ok({
    gauge,
    rings: others.filter(({ kind }) => kind === 'setting-ring'),
    events: events.map(({ id, name }) => ({ id, name })),
    eventId,
    inspectionId: inspection?.id ?? null,
    zone,
    allowed: said?.allowed ?? gauge.division,
    allowedBecause: said
      ? `clause ${said.clause} allows this much`
      : 'the gauge’s division: no clause says how much',
  });
};
