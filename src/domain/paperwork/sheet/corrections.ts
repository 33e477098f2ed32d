import type { JudgedCell } from './judge-cells';
import type { ReadSheet } from './read-sheet';

/** What is to be corrected in each row of a file, from 0, in the file's own order. */
export type Corrections = ReadonlyMap<number, string>;

/** `Lifters!D7` is row 7. */
const rowOf = (cell: string): number => Number(/(\d+)$/.exec(cell)?.[1] ?? 1) - 1;

const bare = (cell: string): string => cell.split('!').at(-1) ?? cell;

/** For a file that is given back: every cell in question with its row, value and remedy, and what was not taken. */
export const correctionsOf = (
  read: Pick<ReadSheet, 'notes' | 'headingRow'>,
  judged: readonly JudgedCell[],
): Corrections => {
  const lines = new Map<number, string[]>();
  const add = (row: number, words: string): void => {
    lines.set(row, [...(lines.get(row) ?? []), words]);
  };
  for (const { cell, state, detail = '', remedy = '' } of judged) {
    if (state === 'ok' || cell.source === undefined) continue;
    const words = detail.replace(' Kept as written.', '');
    add(rowOf(cell.source.cell), `${bare(cell.source.cell)}: ${words} ${remedy}`.trim());
  }
  for (const { where, detail, row } of read.notes) {
    if (row !== undefined) add(row, `${where}: ${detail}`);
  }
  return new Map([...lines].map(([row, words]) => [row, words.join(' ')] as const));
};

/** Text that a spreadsheet would take for a formula is shown as text; numbers stay as they are. */
export const neutral = (cell: string): string =>
  /^[=+\-@\t\r]/.test(cell) &&
  !/^[+-]?[\d.,]+(?:[eE][+-]?\d+)?\s*(?:in|mm|thou|g|lb|°|%)?$/.test(cell)
    ? `'${cell}`
    : cell;
