import type { EntityManager } from '@mikro-orm/postgresql';
import type { CheckAnswer, CheckRequest } from '@/contracts/event/check';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { judgeLineCheck } from '@/domain/inspection/line-check/judge-line-check';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import type { Event } from '@/entities/event/event';
import { GaugeRow } from '@/entities/event/gauge';
import { Inspection } from '@/entities/event/inspection';
import { performAct } from '../../act/perform-act';
import { readStandings } from '../../gauge/gauge-standing';
import { interestsInEntry } from '../../inspection/interest';
import { registered } from '../../inspection/read/inspection-file';
import type { Ports } from '../../ports';
import { lockEvent } from '../lock-event';
import { openInspections } from '../open-inspections';
import { keepCheck } from './keep-check';
import { readAnswer } from './read-answer';
import { rulesByClass } from './read-checks';
import { readCorrection } from './read-correction';

const refuse = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));

const gaugesOf = async (em: EntityManager, { seriesId, id }: Event) => {
  const rows = await em.find(GaugeRow, { seriesId });
  const standings = await readStandings(em, seriesId, id);
  return rows.map((row) => ({ ...registered(row), ...standings.get(row.id) }));
};

/**
 * Keeps one check of one car without teardown, judged by the rules in force. A mandatory clause that is
 * not kept opens an inspection in the same act: nobody is excluded by a check at the line. One that was
 * written down under a wrong gauge is said again under the right one, with the reason; both rows stay.
 */
export const recordCheck = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: CheckRequest & { readonly seriesId: string; readonly eventId: string },
): Promise<Result<CheckAnswer, Failure>> => {
  const { act, seriesId, eventId, ...asked } = input;
  if (!may(actor, 'inspection.record', seriesId) || !isId(eventId)) return fail(absent());
  return performAct<CheckAnswer>(
    deps,
    actor,
    { id: act, kind: 'record-check', seriesId, input: { eventId, ...asked } },
    async (within) => {
      const { em, at, keepRules } = within;
      const event = await lockEvent(em, seriesId, eventId);
      const entry = event && (await em.findOne(Entry, { seriesId, eventId, id: asked.entryId }));
      if (event === null || entry === null) return fail(absent());
      if (entry.state === 'withdrawn')
        return fail(failure('not-in-this-state', `Car ${entry.carNumber} is scratched.`));
      const interest = (await interestsInEntry(em, entry)).get(actor.personId);
      if (interest !== undefined)
        return fail(
          failure(
            'conflict-of-interest',
            `${actor.name} ${interest}. Somebody else checks car ${entry.carNumber}.`,
          ),
        );
      const found = (await rulesByClass(em, event, [entry.classId])).get(entry.classId);
      if (found === undefined)
        return fail(
          failure(
            'not-in-this-state',
            'No rulebook of this class is in force at the event’s start.',
          ),
        );
      const rulesHash = await keepRules(seriesId, found.document);
      const row = {
        series_id: seriesId,
        id: asked.id,
        event_id: eventId,
        entry_id: entry.id,
        clause: asked.clause,
        rules_hash: rulesHash,
        taken_by: actor.personId,
        taken_at: at.toISOString(),
      };
      const keep = (more: Readonly<Record<string, string | undefined>>) =>
        keepCheck(within, { ...row, ...more });
      const before = await em.findOne(Inspection, { seriesId, entryId: entry.id });
      if (asked.takeBack !== undefined) {
        const reason = asked.takeBack.trim();
        if (reason === '') return refuse('/takeBack', 'Write why it is taken back.');
        keep({ answer: '', state: 'taken-back', sentence: '', reason });
        return ok({ state: 'taken-back', sentence: '', inspection: before?.id ?? null });
      }
      const { correction } = asked;
      const again =
        correction === undefined
          ? ok(undefined)
          : await readCorrection(em, { seriesId, eventId }, { ...asked, correction });
      if (!again.ok) return again;
      const takenAt = again.value?.takenAt ?? at.toISOString();
      const read = readAnswer(found.rules, { ...asked, value: again.value?.value ?? asked.value });
      if (!read.ok) return read;
      const { answer, value } = read.value;
      const gauges = await gaugesOf(em, event);
      if (value !== undefined && !gauges.some(({ id }) => id === asked.gaugeId))
        return refuse('/gaugeId', 'Choose the scale or gauge it was read on.');
      const judged = judgeLineCheck(
        found.rules,
        {
          ...asked,
          takenBy: actor.personId,
          takenAt,
          carNumber: entry.carNumber,
          answer: value === undefined ? answer : undefined,
          value,
        },
        { zone: event.zone, gauges },
      );
      const onGauge = value && {
        value_text: value.text,
        value_unit: value.unit,
        value_exact: String(value.exact),
        gauge_id: asked.gaugeId,
      };
      const { state, sentence } = judged;
      const reason = again.value?.reason ?? '';
      keep({ answer, ...onGauge, state, sentence, reason, taken_at: takenAt });
      if (judged.pass !== false || before !== null)
        return ok({ state, sentence, inspection: before?.id ?? null });
      const inspectionId = deps.random.uuid();
      const words = `Clause ${asked.clause}. ${sentence}`.slice(0, 300);
      const pick = { inspectionId, entryId: entry.id, because: 'failed-check', words } as const;
      const opened = await openInspections(within, event, actor.personId, [pick]);
      return opened.ok ? ok({ state, sentence, inspection: inspectionId }) : opened;
    },
  );
};
