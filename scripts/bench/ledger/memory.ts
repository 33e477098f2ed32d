import { lineLeaf } from '@/domain/ledger/line';
import { appendLeaf, EMPTY } from '@/domain/ledger/tree';
import { type Bench, perSecond, say, timed } from './measure';
import { newLine } from './write-line';

/** What writing and hashing cost without a database. */
export const benchMemory = async ({ series, total }: Bench): Promise<void> => {
  const lines = await timed(() => Array.from({ length: total }, (_, i) => newLine(series, i)));
  say(`memory  lines written            ${perSecond(total, lines.ms)}`);
  const grown = await timed(() => {
    let frontier = EMPTY;
    for (const line of lines.value) frontier = appendLeaf(frontier, lineLeaf(line)).frontier;
    return frontier;
  });
  say(`memory  leaves hashed, appended  ${perSecond(total, grown.ms)}`);
};
