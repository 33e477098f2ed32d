import { parse } from 'csv-parse/sync';
import type { EntryRow } from '@/contracts/event/event';

/** What a file of entries comes to, before anything is written. */
export interface EntriesFile {
  readonly rows: readonly (EntryRow & { readonly line: number })[];
  /** `line` counts from 1 as an editor does; the head of the columns is line 1. */
  readonly faults: readonly { readonly line: number; readonly detail: string }[];
}

const HEADS = {
  carNumber: ['car number', 'car', 'number', 'no', 'no.'],
  className: ['class'],
  competitor: ['competitor', 'driver', 'name', 'owner'],
  email: ['e-mail', 'email', 'mail'],
  engine: ['engine', 'engine reference'],
  position: ['position', 'finish', 'pos', 'result'],
} as const;

type Column = keyof typeof HEADS;

const MOST_LINES = 500;

const columnsOf = (head: readonly string[]): ReadonlyMap<Column, number> =>
  new Map(
    (Object.keys(HEADS) as Column[]).flatMap((column) => {
      const at = head.findIndex((cell) =>
        (HEADS[column] as readonly string[]).includes(cell.trim().toLowerCase()),
      );
      return at < 0 ? [] : [[column, at] as const];
    }),
  );

const delimiterOf = (text: string): string => {
  const [first = ''] = text.split('\n');
  return [';', '\t', ','].find((mark) => first.includes(mark)) ?? ',';
};

/** Reads a CSV of entries: each fault with its line, every other line as it would be entered. */
export const readEntriesFile = (
  text: string,
  known: {
    readonly classes: readonly {
      readonly id: string;
      readonly name: string;
      readonly slug: string;
    }[];
    readonly newId: () => string;
  },
): EntriesFile => {
  let records: { record: string[]; info: { lines: number } }[];
  try {
    records = parse(text, {
      bom: true,
      delimiter: delimiterOf(text),
      info: true,
      relax_column_count: true,
      skip_empty_lines: true,
      trim: true,
    }) as unknown as typeof records;
  } catch (error) {
    const line = Number((error as { lines?: number }).lines ?? 1);
    return {
      rows: [],
      faults: [{ line, detail: 'From this line on the file cannot be read: check its quotes.' }],
    };
  }
  const [head, ...body] = records;
  const columns = columnsOf(head?.record ?? []);
  const missing = (['carNumber', 'className', 'competitor'] as const).filter(
    (column) => !columns.has(column),
  );
  if (missing.length > 0)
    return {
      rows: [],
      faults: [
        {
          line: 1,
          detail: `The first line names the columns. Missing: ${missing.map((column) => `"${HEADS[column][0]}"`).join(', ')}.`,
        },
      ],
    };
  if (body.length > MOST_LINES)
    return {
      rows: [],
      faults: [{ line: MOST_LINES + 2, detail: `At most ${MOST_LINES} entries in one file.` }],
    };
  const rows: (EntryRow & { line: number })[] = [];
  const faults: { line: number; detail: string }[] = [];
  for (const { record, info } of body) {
    const { lines: line } = info;
    const cell = (column: Column) => (record[columns.get(column) ?? -1] ?? '').trim();
    const before = faults.length;
    const say = (detail: string) => faults.push({ line, detail });
    const carNumber = cell('carNumber').toUpperCase();
    if (!/^[0-9A-Z]{1,6}$/.test(carNumber))
      say(`"${cell('carNumber')}" is no car number: one to six digits and letters.`);
    const wanted = cell('className').toLowerCase();
    const found = known.classes.find(
      (one) => one.name.toLowerCase() === wanted || one.slug === wanted,
    );
    if (found === undefined)
      say(
        `"${cell('className')}" is no class of this season. Write ${known.classes.map((one) => `"${one.name}"`).join(' or ')}.`,
      );
    const competitorName = cell('competitor');
    if (competitorName === '' || competitorName.length > 120)
      say('The competitor’s name is missing or too long.');
    const position = cell('position');
    if (!/^([1-9]\d{0,2})?$/.test(position)) say(`"${position}" is no finishing position.`);
    const twice = rows.find((row) => row.carNumber === carNumber && row.classId === found?.id);
    if (twice !== undefined) say(`Car ${carNumber} stands on line ${twice.line} already.`);
    if (faults.length > before || found === undefined) continue;
    rows.push({
      line,
      id: known.newId(),
      classId: found.id,
      carNumber,
      competitorName,
      ...(cell('email') === '' ? {} : { competitorEmail: cell('email') }),
      engineReference: cell('engine').slice(0, 40),
      position: position === '' ? null : Number(position),
    });
  }
  if (body.length === 0) faults.push({ line: 2, detail: 'The file holds no entry.' });
  return { rows, faults };
};
