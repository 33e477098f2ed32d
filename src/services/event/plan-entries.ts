import type { EntityManager } from '@mikro-orm/postgresql';
import type { EntryRow } from '@/contracts/event/event';
import type { Fault } from '@/domain/failure';
import { Entry } from '@/entities/event/entry';
import type { Event } from '@/entities/event/event';
import { RaceClass } from '@/entities/series/race-class';
import { knownBy, plain } from './known-by';

/** What one row comes to: a new entry, one that changes, or one that stands as it is. */
export interface Planned {
  readonly row: EntryRow;
  readonly entry: Entry | undefined;
  readonly competitorId: string | null;
  readonly paperworkId: string | null;
  readonly does: 'new' | 'changed' | 'same';
}

const differs = (entry: Entry, row: EntryRow): boolean =>
  (row.engineReference.trim() !== '' && row.engineReference.trim() !== entry.engineReference) ||
  (row.position !== null && row.position !== entry.position) ||
  (row.driver !== undefined && row.driver.trim() !== entry.driver) ||
  (row.laps !== undefined && row.laps.join(' ') !== entry.laps.join(' '));

/**
 * Holds rows against what stands, before anything is written. Every conflict is a fault at its place:
 * another competitor's name, a position that two cars share, a class that is not in the season.
 */
export const planEntries = async (
  em: EntityManager,
  event: Pick<Event, 'seriesId' | 'id' | 'seasonId'>,
  rows: readonly EntryRow[],
): Promise<{ readonly planned: readonly Planned[]; readonly faults: readonly Fault[] }> => {
  const { seriesId, id: eventId, seasonId } = event;
  const classes = await em.find(RaceClass, { seriesId, seasonId });
  const standing = await em.find(Entry, { seriesId, eventId });
  const known = await knownBy(em, seriesId);
  const faults: Fault[] = [];
  const planned = rows.map((row, at): Planned => {
    const say = (field: string, detail: string) =>
      faults.push({ pointer: `/entries/${at}/${field}`, detail });
    const { competitorId, paperworkId, unknownMail } = known(row);
    if (!classes.some((one) => one.id === row.classId))
      say('classId', 'This class is not in the event’s season.');
    if (unknownMail) say('competitorEmail', 'Nobody in this series has this e-mail address.');
    const same = (one: { readonly classId: string; readonly carNumber: string }) =>
      one.classId === row.classId && one.carNumber === row.carNumber;
    if (rows.slice(0, at).some(same))
      say('carNumber', `Car ${row.carNumber} stands in this class twice.`);
    const entry = standing.find(same);
    if (entry !== undefined && plain(entry.competitorName) !== plain(row.competitorName))
      say('competitorName', `Car ${row.carNumber} is entered by ${entry.competitorName}.`);
    const shares = (one: {
      readonly classId: string;
      readonly carNumber: string;
      readonly position?: number | null | undefined;
    }) => one.classId === row.classId && one.position === row.position && !same(one);
    const inFile = (one: Entry) =>
      rows.some((other) => other.classId === one.classId && other.carNumber === one.carNumber);
    const other =
      row.position === null
        ? undefined
        : (rows.slice(0, at).find(shares) ?? standing.find((one) => !inFile(one) && shares(one)));
    if (other !== undefined)
      say(
        'position',
        `Cars ${other.carNumber} and ${row.carNumber} cannot both be ${row.position}.`,
      );
    const does = entry === undefined ? 'new' : differs(entry, row) ? 'changed' : 'same';
    return { row, entry, competitorId, paperworkId, does };
  });
  return { planned, faults };
};
