import { entriesRequest, positionsRequest } from '@/contracts/event/event';
import { readBody } from '@/contracts/read-body';
import type { Actor } from '@/domain/access/permission';
import type { Fault } from '@/domain/failure';
import { readForm } from '@/http/form';
import { enterCars } from '@/services/event/enter-cars';
import type { EventSheet } from '@/services/event/find-event';
import { writePositions } from '@/services/event/write-positions';
import type { Ports } from '@/services/ports';

interface Posted {
  readonly to?: string;
  readonly problems?: readonly { readonly field?: string; readonly message: string }[];
  readonly typed?: ReadonlyMap<string, string>;
}

const problemsAt = (faults: readonly Fault[]) =>
  faults.map(({ pointer, detail }) => {
    const field = pointer.split('/').at(-1) ?? '';
    return /^[a-zA-Z]+$/.test(field) ? { field, message: detail } : { message: detail };
  });

/** What the forms of an event's page ask for: positions, or a car added by hand. */
export const handlePost = async (
  ports: Ports,
  actor: Actor,
  { event, entries }: EventSheet,
  request: Request,
): Promise<Posted> => {
  const typed = await readForm(request);
  const text = (name: string) => (typed.get(name) ?? '').trim();
  const { seriesId, id: eventId } = event;
  const to = `/office/events/${eventId}`;
  const base = { seriesId, eventId };
  const refused = (faults: readonly Fault[]): Posted => ({ typed, problems: problemsAt(faults) });
  const enter = async (rows: unknown): Promise<Posted> => {
    const read = readBody(entriesRequest, {
      act: text('act'),
      entries: rows,
      ...(text('lateReason') === '' ? {} : { lateReason: text('lateReason') }),
    });
    if (!read.ok) return refused(read.failure.faults ?? []);
    const done = await enterCars(ports, actor, { ...read.value, ...base });
    return done.ok
      ? { to: `${to}?saved=car` }
      : refused(done.failure.faults ?? [{ pointer: '', detail: done.failure.detail }]);
  };
  if (text('what') === 'positions') {
    const read = readBody(positionsRequest, {
      act: text('act'),
      positions: entries.map((entry) => ({
        entryId: entry.id,
        position: text(`position ${entry.id}`) === '' ? null : Number(text(`position ${entry.id}`)),
        state: entry.state,
      })),
    });
    if (!read.ok)
      return {
        typed,
        problems: [{ message: 'A position is a whole number from 1; leave it empty for none.' }],
      };
    const done = await writePositions(ports, actor, { ...read.value, ...base });
    return done.ok
      ? { to: `${to}?saved=positions` }
      : {
          typed,
          problems: (done.failure.faults ?? [{ pointer: '', detail: done.failure.detail }]).map(
            ({ detail }) => ({ message: detail }),
          ),
        };
  }
  return enter([
    {
      id: ports.random.uuid(),
      classId: text('classId'),
      carNumber: text('carNumber').toUpperCase(),
      competitorName: text('competitorName'),
      ...(text('competitorEmail') === '' ? {} : { competitorEmail: text('competitorEmail') }),
      engineReference: text('engineReference'),
      ...(text('driver') === '' ? {} : { driver: text('driver') }),
      position: null,
    },
  ]);
};
