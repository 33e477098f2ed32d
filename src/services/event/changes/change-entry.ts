import type { EntityManager } from '@mikro-orm/postgresql';
import type { EntryChange } from '@/contracts/event/event';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { Inspection } from '@/entities/event/inspection';
import { RaceClass } from '@/entities/series/race-class';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockEvent } from '../lock-event';
import { officialClasses, refuseOfficial } from '../results/official-classes';
import { keepChanges } from './keep-changes';

type Changed = Result<{ readonly was: string; readonly becomes: string }, Failure>;

const refuse = (pointer: string, detail: string) => fail(invalid([{ pointer, detail }]));
const notNow = (detail: string) => fail(failure('not-in-this-state', detail));

/** A draw that is announced and neither made nor void has this car in its pool. */
const inOpenDraw = async (em: EntityManager, { seriesId, eventId, classId }: Entry) => {
  const [row] = await em.execute<{ open: boolean }[]>(
    `select exists (select from record.draw d where d.series_id = ? and d.event_id = ? and d.class_id = ?
       and not exists (select from record.draw_end e where e.series_id = d.series_id and e.draw_id = d.id)) as open`,
    [seriesId, eventId, classId],
  );
  return row?.open === true;
};

const toClass = async (
  em: EntityManager,
  entry: Entry,
  seasonId: string,
  becomes: string,
): Promise<Changed> => {
  const { seriesId, eventId, carNumber } = entry;
  const classes = await em.find(RaceClass, { seriesId, seasonId });
  const next = isId(becomes) ? classes.find((one) => one.id === becomes) : undefined;
  if (next === undefined) return refuse('/becomes', 'Choose a class of this season.');
  if (next.id === entry.classId) return refuse('/becomes', 'It is in this class already.');
  if (await inOpenDraw(em, entry))
    return notNow(
      `Car ${carNumber} stands in the pool of an announced draw. Make the draw, or declare it void, first.`,
    );
  const [other] = await em.find(Entry, { seriesId, eventId, classId: next.id, carNumber });
  if (other !== undefined)
    return refuse(
      '/becomes',
      `${next.name} has a car ${carNumber} already: ${other.competitorName}.`,
    );
  const was = classes.find((one) => one.id === entry.classId)?.name ?? '';
  entry.classId = next.id;
  entry.position = null;
  entry.paperworkId = null;
  return ok({ was, becomes: next.name });
};

/** Changes one entry on the day, with its reason: it is kept and stands in the ledger. */
export const changeEntry = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: EntryChange & {
    readonly seriesId: string;
    readonly eventId: string;
    readonly entryId: string;
  },
): Promise<Result<null, Failure>> => {
  const { act, seriesId, eventId, entryId, kind } = input;
  const becomes = input.becomes.trim();
  const reason = input.reason.trim();
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId) || !isId(entryId))
    return fail(absent());
  if (reason === '') return refuse('/reason', 'Write why it changes.');
  return performAct(
    deps,
    actor,
    { id: act, kind: 'change-entry', seriesId, input: { eventId, entryId, kind, becomes, reason } },
    async ({ em, append, line }) => {
      const event = await lockEvent(em, seriesId, eventId);
      const entry = event && (await em.findOne(Entry, { seriesId, eventId, id: entryId }));
      if (event === null || entry === null) return fail(absent());
      const official = await officialClasses(em, { seriesId, eventId });
      const refused = refuseOfficial(official, [entry.classId, becomes]);
      if (refused !== undefined) return refused;
      const picked = (await em.count(Inspection, { seriesId, entryId })) > 0;
      if (picked && kind !== 'driver')
        return notNow(
          `Car ${entry.carNumber} is picked for inspection; it stays as it was picked.`,
        );
      const done = await (async (): Promise<Changed> => {
        if (kind === 'class') return toClass(em, entry, event.seasonId, becomes);
        if (kind === 'scratched' || kind === 'restored') {
          const next = kind === 'scratched' ? 'withdrawn' : 'entered';
          if (entry.state === next)
            return notNow(
              `Car ${entry.carNumber} is ${kind === 'scratched' ? 'scratched' : 'entered'} already.`,
            );
          entry.state = next;
          return ok({ was: '', becomes: '' });
        }
        if (becomes === '') return refuse('/becomes', 'Write what it becomes.');
        if (kind === 'engine') {
          if (becomes.length > 40) return refuse('/becomes', 'At most 40 characters.');
          const was = entry.engineReference;
          entry.engineReference = becomes;
          return ok({ was, becomes });
        }
        const was = entry.driver;
        entry.driver = becomes;
        return ok({ was, becomes });
      })();
      if (!done.ok) return done;
      const change = { id: deps.random.uuid(), entryId, kind, reason, ...done.value };
      keepChanges({ append, line }, { seriesId, eventId, by: actor.personId }, [change]);
      // The answer is kept for good: it repeats no name.
      return ok(null);
    },
  );
};
