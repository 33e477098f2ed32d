import type { EntityManager } from '@mikro-orm/postgresql';
import type { ChecksShown } from '@/contracts/event/check';
import { lineChecksOf } from '@/domain/inspection/line-check/line-checks';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { Event } from '@/entities/event/event';
import { findRules } from '../../rulebook/find-rules';

export interface ClassRules {
  readonly rules: RulesInForce;
  readonly document: string;
}

/** The rules in force at the event's start, by class; a class without a rulebook has none. */
export const rulesByClass = async (
  em: EntityManager,
  event: Pick<Event, 'seriesId' | 'startsAt'>,
  classIds: readonly string[],
): Promise<ReadonlyMap<string, ClassRules>> => {
  const found = new Map<string, ClassRules>();
  for (const classId of new Set(classIds)) {
    const standing = await findRules(em, event.seriesId, classId, event.startsAt);
    if (standing !== undefined)
      found.set(classId, { rules: standing.rules, document: standing.document });
  }
  return found;
};

/** The checks of an event as they stand. */
export const readChecks = async (
  em: EntityManager,
  event: Event,
): Promise<Omit<ChecksShown, 'records'>> => {
  const { seriesId, id: eventId, zone } = event;
  const cars = await em.execute<ChecksShown['cars']>(
    `select e.id as "entryId", e.class_id as "classId", c.name as "className",
            e.car_number as "carNumber", i.id as "inspectionId"
     from public.entry e
     join public.class c on c.series_id = e.series_id and c.id = e.class_id
     left join public.inspection i on i.series_id = e.series_id and i.entry_id = e.id
     where e.series_id = ? and e.event_id = ? and e.state = 'entered'
     order by c.name, length(e.car_number), e.car_number`,
    [seriesId, eventId],
  );
  const rows = await em.execute<
    (Omit<ChecksShown['checked'][number], 'value'> & {
      valueText: string | null;
      valueUnit: string | null;
    })[]
  >(
    `select last.* from (
       select distinct on (k.entry_id, k.clause) k.id, k.entry_id as "entryId", k.clause, k.answer,
              k.value_text as "valueText", k.value_unit as "valueUnit", g.code as gauge, k.state,
              k.sentence, k.reason as "correctedBecause", p.name as by,
              to_char(k.taken_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS"Z"') as at
       from record.event_check k join public.person p on p.id = k.taken_by
       left join public.gauge g on g.series_id = k.series_id and g.id = k.gauge_id
       where k.series_id = ? and k.event_id = ?
       order by k.entry_id, k.clause, k.received_at desc, k.id desc
     ) last where last.state <> 'taken-back'`,
    [seriesId, eventId],
  );
  const gauges = await em.execute<ChecksShown['gauges']>(
    `select id, code, description ->> 'name' as name from public.gauge
     where series_id = ? and status = 'in-use' and description ->> 'kind' in ('scale', 'other')
     order by code`,
    [seriesId],
  );
  const [count] = await em.execute<{ n: string }[]>(
    'select count(*) as n from record.event_check where series_id = ? and event_id = ?',
    [seriesId, eventId],
  );
  const rules = await rulesByClass(
    em,
    event,
    cars.map(({ classId }) => classId),
  );
  return {
    seriesId,
    eventId,
    zone,
    checks: [...rules].flatMap(([classId, { rules: inForce }]) =>
      lineChecksOf(inForce).map((check) => ({
        classId,
        ...check,
        ask:
          check.ask.kind === 'answer'
            ? { kind: 'answer' as const, answers: check.ask.answers.map((one) => ({ ...one })) }
            : check.ask,
      })),
    ),
    cars,
    checked: rows.map(({ valueText, valueUnit, ...row }) => ({
      ...row,
      value: valueText === null || valueUnit === null ? null : { text: valueText, unit: valueUnit },
    })),
    gauges,
    mark: count?.n ?? '0',
  };
};
