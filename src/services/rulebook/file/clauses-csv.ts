import { parse } from 'csv-parse/sync';
import { type RulebookContent, readRulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Failure, type Fault, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Clause } from '@/domain/rulebook/clause';
import { toDocument } from '@/domain/rulebook/document';

/** Columns by name, in any order; `refs` are numbers joined by spaces, the last two hold JSON. */
export const CSV_COLUMNS = [
  'number',
  'heading',
  'words',
  'force',
  'penalty row',
  'refs',
  'definitions',
  'requirement',
] as const;

type Column = (typeof CSV_COLUMNS)[number];

const quoted = (cell: string): string =>
  /[",\r\n]|^\s|\s$/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;

const json = (value: unknown): string =>
  value === undefined ? '' : JSON.stringify(toDocument(value));

const cellsOf = (clause: Clause): Readonly<Record<Column, string>> => ({
  number: clause.number,
  heading: clause.heading,
  words: clause.words,
  force: clause.force,
  'penalty row': clause.penaltyRow ?? '',
  refs: clause.refs?.join(' ') ?? '',
  definitions: json(clause.definitions),
  requirement: json(clause.requirement),
});

/** Clauses as CSV (RFC 4180, UTF-8): nothing of them is lost. */
export const clausesCsv = (clauses: readonly Clause[]): string => {
  const rows = clauses.map((clause) => {
    const cells = cellsOf(clause);
    return CSV_COLUMNS.map((column) => quoted(cells[column])).join(',');
  });
  return `${[CSV_COLUMNS.join(','), ...rows].join('\r\n')}\r\n`;
};

interface Line {
  readonly line: number;
  readonly cells: Readonly<Record<string, string>>;
}

const readLines = (text: string): Result<readonly Line[], Failure> => {
  try {
    const records = parse(text, {
      bom: true,
      columns: (head: string[]) => head.map((name) => name.trim().toLowerCase()),
      info: true,
      skip_empty_lines: true,
    }) as unknown as { record: Record<string, string>; info: { lines: number } }[];
    // A record's last line; words may run over several.
    return ok(records.map(({ record, info }) => ({ line: info.lines, cells: record })));
  } catch (error) {
    const detail = error instanceof Error ? error.message : 'This is no CSV.';
    return fail(invalid([{ pointer: '', detail: `This cannot be read as CSV: ${detail}.` }]));
  }
};

const parsed = (cell: string): { readonly value?: unknown; readonly wrong?: true } => {
  if (cell.trim() === '') return {};
  try {
    return { value: JSON.parse(cell) as unknown };
  } catch {
    return { wrong: true };
  }
};

const clauseOf = ({ line, cells }: Line): { clause: unknown; faults: readonly Fault[] } => {
  const cell = (column: Column) => cells[column] ?? '';
  const requirement = parsed(cell('requirement'));
  const definitions = parsed(cell('definitions'));
  const refs = cell('refs')
    .split(/[\s,;]+/)
    .filter((ref) => ref !== '');
  const force = cell('force').trim() === '' ? 'text' : cell('force').trim();
  const faults = [
    ...(requirement.wrong ? ['requirement'] : []),
    ...(definitions.wrong ? ['definitions'] : []),
  ].map((column) => ({
    pointer: `/line ${line}/${column}`,
    detail: `Line ${line}, ${column}: this is not JSON.`,
  }));
  return {
    faults,
    clause: {
      number: cell('number').trim(),
      heading: cell('heading'),
      words: cell('words'),
      force,
      ...(cell('penalty row') !== '' && { penaltyRow: cell('penalty row') }),
      ...(refs.length > 0 && { refs }),
      ...(definitions.value !== undefined && { definitions: definitions.value }),
      ...(requirement.value !== undefined && { requirement: requirement.value }),
    },
  };
};

/** Reads clauses out of CSV; every fault says its line and column, and nothing is taken by half. */
export const readClausesCsv = (text: string): Result<RulebookContent['clauses'], Failure> => {
  const lines = readLines(text);
  if (!lines.ok) return lines;
  const [first] = lines.value;
  if (first === undefined || first.cells['number'] === undefined) {
    const detail = `The first line names the columns: ${CSV_COLUMNS.join(', ')}. At least number is needed.`;
    return fail(invalid([{ pointer: '', detail }]));
  }
  const known: readonly string[] = CSV_COLUMNS;
  const strange = Object.keys(first.cells).filter((name) => name !== '' && !known.includes(name));
  const rows = lines.value.map(clauseOf);
  const read = readRulebookContent({ clauses: rows.map((row) => row.clause), penalties: [] });
  const faults = [
    ...strange.map((name) => ({ pointer: '', detail: `There is no column "${name}" here.` })),
    ...rows.flatMap((row) => row.faults),
    ...(read.ok ? [] : (read.failure.faults ?? [])).map(({ pointer, detail }) => {
      const [, , index = '', ...rest] = pointer.split('/');
      const line = lines.value[Number(index)]?.line ?? 0;
      const column = rest.join('/');
      return { pointer: `/line ${line}/${column}`, detail: `Line ${line}, ${column}: ${detail}` };
    }),
  ];
  if (faults.length > 0) return fail(invalid(faults));
  return read.ok ? ok(read.value.clauses) : read;
};
