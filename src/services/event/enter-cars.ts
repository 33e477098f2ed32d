import type { EntryRow } from '@/contracts/event/event';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { ColumnChoice } from '@/entities/event/column-choice';
import { Entry } from '@/entities/event/entry';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { type EntryChanged, keepChanges } from './changes/keep-changes';
import { lockEvent } from './lock-event';
import { type Planned, planEntries } from './plan-entries';
import { officialClasses, refuseOfficial, resultsStateOf } from './results/official-classes';

export interface CarsToEnter {
  readonly seriesId: string;
  readonly eventId: string;
  readonly entries: readonly EntryRow[];
}

const change = (entry: Entry, { row, competitorId, paperworkId }: Planned): void => {
  entry.engineReference = row.engineReference.trim() || entry.engineReference;
  entry.position = row.position ?? entry.position;
  entry.driver = row.driver?.trim() ?? entry.driver;
  if (row.laps !== undefined) entry.laps = [...row.laps];
  entry.competitorId ??= competitorId;
  entry.paperworkId ??= paperworkId;
};

/**
 * Adds entries to an event, by hand or from a file. A car that is entered in its class already is
 * changed; another competitor's name for it is a fault, not a change. All or nothing.
 */
export const enterCars = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: CarsToEnter & {
    readonly act: string;
    readonly lateReason?: string | undefined;
    readonly columns?: Readonly<Record<string, string>> | undefined;
  },
): Promise<Result<{ readonly count: number }, Failure>> => {
  const { act, seriesId, eventId, entries, columns } = input;
  const lateReason = input.lateReason?.trim() ?? '';
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId)) return fail(absent());
  return performAct(
    deps,
    actor,
    {
      id: act,
      kind: 'enter-cars',
      seriesId,
      input: { eventId, entries, lateReason, columns: columns ?? {} },
    },
    async ({ em, at, append, line }) => {
      // The event's row is the queue in which all that changes its entries stands.
      const event = await lockEvent(em, seriesId, eventId);
      if (event === null) return fail(absent());
      const { planned, faults } = await planEntries(em, event, entries);
      if (faults.length > 0) return fail(invalid(faults));
      const touched = planned.filter(({ does }) => does !== 'same');
      const official = await officialClasses(em, { seriesId, eventId });
      const refused = refuseOfficial(
        official,
        touched.map(({ row }) => row.classId),
      );
      if (refused !== undefined) return refused;
      const late: EntryChanged[] = [];
      for (const one of touched) {
        const { row, entry, competitorId, paperworkId } = one;
        if (entry !== undefined) change(entry, one);
        else {
          em.persist(
            em.create(Entry, {
              seriesId,
              id: row.id,
              eventId,
              classId: row.classId,
              carNumber: row.carNumber,
              competitorId,
              competitorName: row.competitorName.trim(),
              driver: row.driver?.trim() ?? '',
              laps: row.laps ?? [],
              engineReference: row.engineReference.trim(),
              paperworkId,
              position: row.position,
              state: 'entered',
              version: 1,
            }),
          );
          if (lateReason !== '')
            late.push({
              id: deps.random.uuid(),
              entryId: row.id,
              kind: 'late-entry',
              was: '',
              becomes: `Car ${row.carNumber}`,
              reason: lateReason,
            });
        }
      }
      if (columns !== undefined) {
        const chosen = { columns, updatedBy: actor.personId, updatedAt: at };
        await em.upsert(ColumnChoice, { seriesId, purpose: 'entries', ...chosen });
      }
      await em.flush();
      const all = await em.find(Entry, { seriesId, eventId });
      event.resultsState = resultsStateOf(all, official);
      keepChanges({ append, line }, { seriesId, eventId, by: actor.personId }, late);
      return ok({ count: entries.length });
    },
  );
};
