import { type EntryRow, entriesRequest } from '@/contracts/event/event';
import { readBody } from '@/contracts/read-body';
import type { Actor } from '@/domain/access/permission';
import type { Fault } from '@/domain/failure';
import { enterCars } from '@/services/event/enter-cars';
import {
  type ColumnChoices,
  FIELDS,
  guessColumns,
  lapColumns,
  plainHead,
} from '@/services/event/entries-file/columns';
import { findColumns } from '@/services/event/entries-file/find-columns';
import { readEntries } from '@/services/event/entries-file/read-entries';
import { type FileFault, readTable, type Table } from '@/services/event/entries-file/read-table';
import type { EventSheet } from '@/services/event/find-event';
import { tryCars } from '@/services/event/try-cars';
import { readText } from '@/services/paperwork/sheet/read-text';
import type { Ports } from '@/services/ports';

export interface Look {
  readonly table: Table;
  readonly heads: readonly string[];
  readonly laps: number;
  readonly choices: ColumnChoices;
  readonly usualClass: string;
  readonly rows: readonly (EntryRow & { readonly line: number })[];
  readonly does: readonly ('new' | 'changed' | 'same')[];
  readonly faults: readonly FileFault[];
}

interface Posted {
  readonly to?: string;
  readonly text?: string;
  readonly look?: Look;
  readonly problems?: readonly { readonly message: string }[];
}

/** A fault of a row, at the row's line in the file. */
const atLine = (faults: readonly Fault[], rows: Look['rows']): readonly FileFault[] =>
  faults.map(({ pointer, detail }) => {
    const at = /^\/entries\/(\d+)/.exec(pointer)?.[1];
    return { line: rows[Number(at ?? -1)]?.line ?? 1, detail };
  });

/** Reads a file through, with the columns as they were chosen; enters it only when that is asked. */
export const handleImport = async (
  ports: Ports,
  actor: Actor,
  { event, classes }: EventSheet,
  request: Request,
): Promise<Posted> => {
  const form = await request.formData();
  const said = (name: string) => {
    const value = form.get(name);
    return typeof value === 'string' ? value : '';
  };
  const upload = form.get('upload');
  const text =
    upload instanceof File && upload.size > 0
      ? readText(new Uint8Array(await upload.arrayBuffer()))
      : said('csv');
  const read = readTable(text);
  if ('fault' in read)
    return { text, problems: [{ message: `Line ${read.fault.line}: ${read.fault.detail}` }] };
  const { table } = read;
  const { seriesId, id: eventId } = event;
  const chosen = form.has('column-carNumber');
  const choices: ColumnChoices = chosen
    ? Object.fromEntries(
        FIELDS.map((field) => [field, said(`column-${field}`)]).filter(([, name]) => name !== ''),
      )
    : guessColumns(table.heads, await findColumns(ports, actor, seriesId));
  const only = classes.length === 1 ? classes[0]?.id : undefined;
  const usualClass = chosen ? said('usualClass') : (only ?? '');
  const { rows, faults } = readEntries(table, choices, {
    classes,
    usualClass: usualClass === '' ? undefined : usualClass,
    newId: () => ports.random.uuid(),
  });
  const entries = rows.map(({ line: _, ...row }) => row);
  const tried = await tryCars(ports, actor, { seriesId, eventId, entries });
  if (!tried.ok) return { text, problems: [{ message: tried.failure.detail }] };
  const look: Look = {
    table,
    heads: table.heads.map(plainHead),
    laps: lapColumns(table.heads).length,
    choices,
    usualClass,
    rows,
    does: tried.value.does,
    faults: [...faults, ...atLine(tried.value.faults, rows)].sort((a, b) => a.line - b.line),
  };
  if (said('then') !== 'enter' || look.faults.length > 0) return { text, look };
  const body = readBody(entriesRequest, { act: said('act'), entries, columns: choices });
  if (!body.ok) return { text, look, problems: [{ message: body.failure.detail }] };
  const done = await enterCars(ports, actor, { ...body.value, seriesId, eventId });
  if (done.ok) return { to: `/office/events/${eventId}?saved=file` };
  const again = atLine(done.failure.faults ?? [], rows);
  return {
    text,
    look: { ...look, faults: again },
    problems: again.length > 0 ? [] : [{ message: done.failure.detail }],
  };
};
