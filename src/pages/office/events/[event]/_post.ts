import { entriesRequest, positionsRequest } from '@/contracts/event/event';
import { readBody } from '@/contracts/read-body';
import type { Actor } from '@/domain/access/permission';
import type { Fault } from '@/domain/failure';
import { enterCars } from '@/services/event/enter-cars';
import type { EventSheet } from '@/services/event/find-event';
import { type EntriesFile, readEntriesFile } from '@/services/event/read-entries-file';
import { writePositions } from '@/services/event/write-positions';
import type { Ports } from '@/services/ports';

interface Posted {
  readonly to?: string;
  readonly problems?: readonly { readonly field?: string; readonly message: string }[];
  readonly typed?: ReadonlyMap<string, string>;
  readonly file?: EntriesFile;
}

const problemsAt = (faults: readonly Fault[]) =>
  faults.map(({ pointer, detail }) => {
    const field = pointer.split('/').at(-1) ?? '';
    return /^[a-zA-Z]+$/.test(field) ? { field, message: detail } : { message: detail };
  });

/** The text fields, the lines of a chosen file in the place of pasted ones. */
const readWithFile = async (request: Request): Promise<ReadonlyMap<string, string>> => {
  const form = await request.formData();
  const fields = new Map<string, string>();
  for (const [name, value] of form.entries())
    if (typeof value === 'string') fields.set(name, value);
  const upload = form.get('upload');
  if (upload instanceof File && upload.size > 0) fields.set('csv', await upload.text());
  return fields;
};

/** What the forms of an event's page ask for. A file is first read through; nothing is written then. */
export const handlePost = async (
  ports: Ports,
  actor: Actor,
  { event, classes, entries }: EventSheet,
  request: Request,
): Promise<Posted> => {
  const typed = await readWithFile(request);
  const text = (name: string) => (typed.get(name) ?? '').trim();
  const { seriesId, id: eventId } = event;
  const to = `/office/events/${eventId}`;
  const base = { seriesId, eventId };
  const refused = (faults: readonly Fault[]): Posted => ({ typed, problems: problemsAt(faults) });
  const enter = async (rows: unknown): Promise<Posted> => {
    const read = readBody(entriesRequest, { act: text('act'), entries: rows });
    if (!read.ok) return refused(read.failure.faults ?? []);
    const done = await enterCars(ports, actor, { ...read.value, ...base });
    return done.ok
      ? { to }
      : refused(done.failure.faults ?? [{ pointer: '', detail: done.failure.detail }]);
  };
  if (text('what') === 'positions') {
    const read = readBody(positionsRequest, {
      act: text('act'),
      positions: entries.map((entry) => ({
        entryId: entry.id,
        position: text(`position ${entry.id}`) === '' ? null : Number(text(`position ${entry.id}`)),
        state: typed.has(`withdrawn ${entry.id}`) ? 'withdrawn' : 'entered',
      })),
    });
    if (!read.ok)
      return {
        typed,
        problems: [{ message: 'A position is a whole number from 1; leave it empty for none.' }],
      };
    const done = await writePositions(ports, actor, { ...read.value, ...base });
    return done.ok
      ? { to }
      : {
          typed,
          problems: (done.failure.faults ?? [{ pointer: '', detail: done.failure.detail }]).map(
            ({ detail }) => ({ message: detail }),
          ),
        };
  }
  if (text('what') === 'file') {
    const file = readEntriesFile(typed.get('csv') ?? '', {
      classes,
      newId: () => ports.random.uuid(),
    });
    if (text('then') !== 'enter' || file.faults.length > 0) return { typed, file };
    const done = await enter(file.rows.map(({ line: _line, ...row }) => row));
    return done.to === undefined ? { ...done, file } : done;
  }
  return enter([
    {
      id: ports.random.uuid(),
      classId: text('classId'),
      carNumber: text('carNumber').toUpperCase(),
      competitorName: text('competitorName'),
      ...(text('competitorEmail') === '' ? {} : { competitorEmail: text('competitorEmail') }),
      engineReference: text('engineReference'),
      position: null,
    },
  ]);
};
