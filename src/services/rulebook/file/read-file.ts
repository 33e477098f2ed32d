import { type RulebookFile, readRulebookFile } from '@/contracts/rulebook/read-rulebook';
import { type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { PenaltyRow } from '@/domain/rulebook/edition';
import { readClausesCsv } from './clauses-csv';

const parse = (text: string): unknown => {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
};

/** A place that a person finds in the file: `clauses 12 (7.4.3), requirement, max`. */
const placed = (file: unknown, { pointer, detail }: Fault): Fault => {
  const steps = pointer.split('/').slice(1);
  const [list, index, ...rest] = steps;
  const clause =
    list === 'clauses' && index !== undefined
      ? (file as { clauses?: { number?: unknown }[] }).clauses?.[Number(index)]
      : undefined;
  const number = typeof clause?.number === 'string' ? ` (${clause.number})` : '';
  const words = [
    index === undefined ? list : `${list} ${Number(index) + 1}${number}`,
    ...rest,
  ].filter((step) => step !== undefined && step !== '');
  return { pointer, detail: words.length === 0 ? detail : `${words.join(', ')}: ${detail}` };
};

/**
 * Reads a rulebook out of a file: JSON in the published format, or clauses as CSV with the penalty
 * schedule given beside. Every fault with its place; nothing is taken by half.
 */
export const readFile = (
  name: string,
  text: string,
  penalties: readonly PenaltyRow[],
): Result<Omit<RulebookFile, 'format' | 'version'>, Failure> => {
  const lower = name.toLowerCase();
  if (lower.endsWith('.csv')) {
    const clauses = readClausesCsv(text);
    if (!clauses.ok) return clauses;
    const rows = penalties.map((row) => ({ ...row, penalties: [...row.penalties] }));
    return ok({ title: name.slice(0, 200), clauses: clauses.value, penalties: rows });
  }
  if (!lower.endsWith('.json')) {
    return fail(failure('unsupported-file', 'Give a rulebook as .json, or its clauses as .csv.'));
  }
  const value = parse(text);
  if (value === undefined) {
    return fail(invalid([{ pointer: '', detail: 'The file is not JSON.' }]));
  }
  const read = readRulebookFile(value);
  if (!read.ok) {
    return fail(invalid((read.failure.faults ?? []).map((fault) => placed(value, fault))));
  }
  const { title, clauses, penalties: rows } = read.value;
  return ok({ title, clauses, penalties: rows });
};
