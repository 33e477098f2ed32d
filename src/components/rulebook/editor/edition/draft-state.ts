import type { Clause } from '@/domain/rulebook/clause';
import type { PenaltyRow } from '@/domain/rulebook/edition';
import type { EditionContent, Titled } from '../saving/parts';
import { numberBeside, numberUnder, type Row, renumber, sortRows } from './numbering';

export const PENALTIES = 'penalties';

export interface DraftState {
  readonly title: string;
  readonly rows: readonly Row[];
  readonly penalties: readonly PenaltyRow[];
  /** Key of the clause that stands open as a form, or `PENALTIES`. */
  readonly open: string | undefined;
  /** What was removed last, to be put back. */
  readonly removed: Row | undefined;
  readonly made: number;
}

export type DraftAct =
  | { readonly do: 'title'; readonly title: string }
  | { readonly do: 'open'; readonly key: string | undefined }
  | { readonly do: 'change'; readonly key: string; readonly clause: Clause }
  | { readonly do: 'renumber'; readonly key: string; readonly number: string }
  | { readonly do: 'add'; readonly where: 'beside' | 'under' | 'end'; readonly key?: string }
  | { readonly do: 'remove'; readonly key: string }
  | { readonly do: 'put-back' }
  | { readonly do: 'penalties'; readonly penalties: readonly PenaltyRow[] }
  | { readonly do: 'take'; readonly draft: Titled<EditionContent> };

export const draftState = ({ title, content }: Titled<EditionContent>): DraftState => ({
  title,
  rows: sortRows(content.clauses.map((clause, i) => ({ key: `c${i}`, clause }))),
  penalties: content.penalties,
  open: undefined,
  removed: undefined,
  made: content.clauses.length,
});

const fresh = (number: string): Clause => ({ number, heading: '', words: '', force: 'text' });

const added = (state: DraftState, where: 'beside' | 'under' | 'end', key?: string): DraftState => {
  const { rows, made } = state;
  const from = rows.find((row) => row.key === key)?.clause.number;
  const number = where === 'under' ? numberUnder(rows, from) : numberBeside(rows, from);
  const row = { key: `c${made}`, clause: fresh(number) };
  return { ...state, rows: sortRows([...rows, row]), open: row.key, made: made + 1 };
};

export const reduceDraft = (state: DraftState, act: DraftAct): DraftState => {
  const { rows } = state;
  switch (act.do) {
    case 'title':
      return { ...state, title: act.title };
    case 'open':
      return { ...state, open: act.key };
    case 'change':
      return {
        ...state,
        rows: rows.map((row) => (row.key === act.key ? { key: row.key, clause: act.clause } : row)),
      };
    case 'renumber':
      return { ...state, rows: renumber(rows, act.key, act.number) };
    case 'add':
      return added(state, act.where, act.key);
    case 'remove':
      return {
        ...state,
        rows: rows.filter((row) => row.key !== act.key),
        removed: rows.find((row) => row.key === act.key),
        open: undefined,
      };
    case 'put-back':
      return state.removed === undefined
        ? state
        : { ...state, rows: sortRows([...rows, state.removed]), removed: undefined };
    case 'penalties':
      return { ...state, penalties: act.penalties };
    case 'take':
      return draftState(act.draft);
  }
};
