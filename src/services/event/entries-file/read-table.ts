import { parse } from 'csv-parse/sync';
import { delimiterOf } from '../../paperwork/sheet/csv/csv-form';

/** Rows as they stand in the file; `line` counts from 1 as an editor does. */
export interface Table {
  readonly heads: readonly string[];
  readonly headLine: number;
  readonly rows: readonly { readonly line: number; readonly cells: readonly string[] }[];
}

export interface FileFault {
  readonly line: number;
  readonly detail: string;
}

const MOST_LINES = 500;
const MOST_COLUMNS = 400;

interface Parsed {
  readonly record: string[];
  readonly info: { readonly lines: number };
}

const columnsIn = (cells: readonly string[]): number => cells.filter((cell) => cell !== '').length;

/** A CSV as a table. Title lines above the columns' names are passed over: they fill fewer cells. */
export const readTable = (
  text: string,
): { readonly table: Table } | { readonly fault: FileFault } => {
  const clean = text.replace(/^\uFEFF/, '');
  const { delimiter, body } = delimiterOf(clean);
  const passed = body.length < clean.length ? 1 : 0;
  let records: Parsed[];
  try {
    records = parse(body, {
      delimiter,
      info: true,
      relax_column_count: true,
      skip_empty_lines: true,
      trim: true,
    }) as unknown as Parsed[];
  } catch (error) {
    const line = Number((error as { lines?: number }).lines ?? 1) + passed;
    return {
      fault: { line, detail: 'From this line on the file cannot be read: check its quotes.' },
    };
  }
  const widest = Math.max(0, ...records.slice(0, 50).map(({ record }) => columnsIn(record)));
  const first = records.findIndex(
    ({ record }) => columnsIn(record) > 1 && columnsIn(record) * 2 > widest,
  );
  const head = records[first];
  if (head === undefined || widest < 2)
    return { fault: { line: 1, detail: 'The file needs a line that names its columns.' } };
  if (head.record.length > MOST_COLUMNS)
    return { fault: { line: head.info.lines, detail: `At most ${MOST_COLUMNS} columns.` } };
  const rest = records.slice(first + 1).filter(({ record }) => columnsIn(record) > 0);
  if (rest.length > MOST_LINES)
    return {
      fault: { line: MOST_LINES + 2, detail: `At most ${MOST_LINES} entries in one file.` },
    };
  if (rest.length === 0)
    return { fault: { line: head.info.lines + passed + 1, detail: 'The file holds no entry.' } };
  return {
    table: {
      heads: head.record,
      headLine: head.info.lines + passed,
      rows: rest.map(({ record, info }) => ({ line: info.lines + passed, cells: record })),
    },
  };
};
