import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Entry } from '@/entities/event/entry';
import { Event } from '@/entities/event/event';
import { performAct } from '../act/perform-act';
import { isId } from '../paperwork/own-paperwork';
import type { Ports } from '../ports';

export interface WrittenPosition {
  readonly entryId: string;
  readonly position: number | null;
  readonly state: 'entered' | 'withdrawn';
}

/** Writes finishing positions. Two cars of a class cannot share one; results stay unofficial. */
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
    async ({ em }) => {
      const event = await em.findOne(Event, { seriesId, id: eventId });
      if (event === null) return fail(absent());
      const entries = await em.find(Entry, { seriesId, eventId });
      const faults: Fault[] = [];
      for (const [at, row] of positions.entries()) {
        const entry = entries.find((one) => one.id === row.entryId);
        if (entry === undefined) return fail(absent());
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
      if (entries.some((entry) => entry.position !== null)) event.resultsState = 'unofficial';
      return ok({ count: positions.length });
    },
  );
};
