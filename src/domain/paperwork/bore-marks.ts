import type { ClauseResult, State } from '../rulebook/clause-result';
import type { SheetForm } from '../rulebook/form/form';
import { type BoreLayout, boreName, positionsOf } from '../tappet/layout/bore-layout';
import type { JudgedCell } from './sheet/judge-cells';

/** What the bore map shows of a draft. `to-correct` goes before every result. */
export type BoreMark = 'to-correct' | 'outside' | 'too-close' | 'within' | 'not-measured';

const OUT: readonly State[] = ['outside', 'does-not-comply'];

/** One mark a bore: what is wrong with it, or that every column of the sheet is there. */
export const boreMarks = (
  layout: BoreLayout,
  form: SheetForm,
  judged: readonly JudgedCell[],
  results: readonly ClauseResult[],
): ReadonlyMap<string, BoreMark> =>
  new Map(
    positionsOf(layout).map((position): [string, BoreMark] => {
      const key = boreName(position);
      const cells = judged.filter(({ cell }) => cell.position === key);
      const states = results
        .filter((result) => form.clauses.includes(result.clause))
        .flatMap((result) => result.perPosition.filter((row) => row.position === key))
        .map((row) => row.state);
      if (cells.some(({ state }) => state !== 'ok')) return [key, 'to-correct'];
      if (states.some((state) => OUT.includes(state))) return [key, 'outside'];
      if (states.includes('too-close')) return [key, 'too-close'];
      const full = form.columns.every(({ quantity }) =>
        cells.some(({ cell }) => cell.quantity === quantity),
      );
      return [key, full && cells.length > 0 ? 'within' : 'not-measured'];
    }),
  );
