import type { EntityManager } from '@mikro-orm/postgresql';
import type { EntryRow } from '@/contracts/event/event';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { Event } from '@/entities/event/event';
import { RaceClass } from '@/entities/series/race-class';
import { performAct } from '../act/perform-act';
import { isId } from '../paperwork/own-paperwork';
import type { Ports } from '../ports';

interface Declared {
  readonly id: string;
  readonly class_id: string;
  readonly car_number: string;
  readonly competitor_id: string;
  readonly name: string;
  readonly email: string;
}

const plain = (text: string): string => text.trim().toLowerCase();

/** Paperwork and people by which a car's competitor is known: by e-mail, else by its paperwork. */
const knownBy = async (em: EntityManager, seriesId: string) => {
  const paperwork = await em.execute<Declared[]>(
    `select p.id, p.class_id, p.car_number, p.competitor_id, c.name, c.email
     from public.paperwork p join public.person c on c.id = p.competitor_id
     where p.series_id = ? and p.state <> 'withdrawn'`,
    [seriesId],
  );
  const people = await em.execute<{ id: string; email: string }[]>(
    `select distinct p.id, p.email from public.person p
     join public.membership m on m.person_id = p.id and m.ended_at is null where m.series_id = ?`,
    [seriesId],
  );
  return (row: EntryRow) => {
    const byMail = people.find((person) => person.email === plain(row.competitorEmail ?? ''));
    const papers = paperwork.filter(
      (paper) => paper.class_id === row.classId && paper.car_number === row.carNumber,
    );
    const paper = papers.find(
      (one) => one.competitor_id === byMail?.id || plain(one.name) === plain(row.competitorName),
    );
    return {
      competitorId: byMail?.id ?? paper?.competitor_id ?? null,
      paperworkId: paper?.id ?? null,
      unknownMail: plain(row.competitorEmail ?? '') !== '' && byMail === undefined,
    };
  };
};

/**
 * Adds entries to an event, by hand or from a file. A car that is entered in its class already is
 * changed; another competitor's name for it is a fault, not a change. All or nothing.
 */
export const enterCars = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    readonly entries: readonly EntryRow[];
  },
): Promise<Result<{ readonly count: number }, Failure>> => {
  const { act, seriesId, eventId, entries } = input;
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'enter-cars', seriesId, input: { eventId, entries } },
    async ({ em }) => {
      const event = await em.findOne(Event, { seriesId, id: eventId });
      if (event === null) return fail(absent());
      const classes = await em.find(RaceClass, { seriesId, seasonId: event.seasonId });
      const standing = await em.find(Entry, { seriesId, eventId });
      const known = await knownBy(em, seriesId);
      const faults: Fault[] = [];
      for (const [at, row] of entries.entries()) {
        const say = (field: string, detail: string) =>
          faults.push({ pointer: `/entries/${at}/${field}`, detail });
        const { competitorId, paperworkId, unknownMail } = known(row);
        if (!classes.some((one) => one.id === row.classId))
          say('classId', 'This class is not in the event’s season.');
        if (unknownMail) say('competitorEmail', 'Nobody in this series has this e-mail address.');
        const same = (one: { readonly classId: string; readonly carNumber: string }) =>
          one.classId === row.classId && one.carNumber === row.carNumber;
        if (entries.slice(0, at).some(same))
          say('carNumber', `Car ${row.carNumber} stands in this class twice.`);
        const entry = standing.find(same);
        if (entry !== undefined && plain(entry.competitorName) !== plain(row.competitorName))
          say('competitorName', `Car ${row.carNumber} is entered by ${entry.competitorName}.`);
        if (entry === undefined) {
          em.persist(
            em.create(Entry, {
              seriesId,
              id: row.id,
              eventId,
              classId: row.classId,
              carNumber: row.carNumber,
              competitorId,
              competitorName: row.competitorName.trim(),
              engineReference: row.engineReference.trim(),
              paperworkId,
              position: row.position,
              state: 'entered',
              version: 1,
            }),
          );
        } else {
          entry.engineReference = row.engineReference.trim() || entry.engineReference;
          entry.position = row.position ?? entry.position;
          entry.competitorId ??= competitorId;
          entry.paperworkId ??= paperworkId;
        }
      }
      if (faults.length > 0) return fail(invalid(faults));
      if (entries.some((row) => row.position !== null) && event.resultsState === 'none')
        event.resultsState = 'unofficial';
      return ok({ count: entries.length });
    },
  );
};
