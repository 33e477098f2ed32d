import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { performAct } from '../act/perform-act';
import type { Ports } from '../ports';
import { type EntryChanged, keepChanges } from './changes/keep-changes';
import { lockEvent } from './lock-event';
import { officialClasses, refuseOfficial, resultsStateOf } from './results/official-classes';

export interface WrittenPosition {
  readonly entryId: string;
  readonly position: number | null;
  readonly state: 'entered' | 'withdrawn';
}

/**
 * Writes finishing positions. Two cars of a class cannot share one; results stay unofficial, and
 * official ones are not touched.
 */
export const writePositions = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly eventId: string;
    readonly positions: readonly WrittenPosition[];
  },
): Promise<Result<{ readonly count: number }, Failure>> => {
  const { act, seriesId, eventId, positions } = input;
  if (!may(actor, 'event.manage', seriesId) || !isId(eventId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'write-positions', seriesId, input: { eventId, positions } },
    async ({ em, append, line }) => {
      const event = await lockEvent(em, seriesId, eventId);
      if (event === null) return fail(absent());
      const entries = await em.find(Entry, { seriesId, eventId });
      const official = await officialClasses(em, { seriesId, eventId });
      const faults: Fault[] = [];
      const changes: EntryChanged[] = [];
      for (const [at, row] of positions.entries()) {
        const entry = entries.find((one) => one.id === row.entryId);
        if (entry === undefined) return fail(absent());
        const moves = entry.position !== row.position || entry.state !== row.state;
        const refused = moves ? refuseOfficial(official, [entry.classId]) : undefined;
        if (refused !== undefined) return refused;
        if (entry.state !== row.state)
          changes.push({
            id: deps.random.uuid(),
            entryId: entry.id,
            kind: row.state === 'withdrawn' ? 'scratched' : 'restored',
            was: '',
            becomes: '',
            reason: 'Marked with the positions.',
          });
        entry.position = row.position;
        entry.state = row.state;
        const other = entries.find(
          (one) =>
            one !== entry &&
            one.classId === entry.classId &&
            one.position !== null &&
            one.position === row.position &&
            !positions.some((later, place) => place > at && later.entryId === one.id),
        );
        if (other !== undefined)
          faults.push({
            pointer: `/positions/${at}/position`,
            detail: `Cars ${entry.carNumber} and ${other.carNumber} cannot both be ${row.position}.`,
          });
      }
      if (faults.length > 0) return fail(invalid(faults));
      event.resultsState = resultsStateOf(entries, official);
      keepChanges({ append, line }, { seriesId, eventId, by: actor.personId }, changes);
      return ok({ count: positions.length });
    },
  );
};
