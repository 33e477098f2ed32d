import type { ReactNode } from 'react';

export type SheetState = 'draft' | 'live' | 'closed';

interface StateSheetProps {
  /** Draft: dashed. Live or provisional: solid. Signed and closed, final: double with a cut corner. */
  readonly state: SheetState;
  /** The state in words: "Draft", "Provisional until …", "Signed and closed 2026-07-12 09:20". */
  readonly words?: string;
  /** True only on the page that closed the record: the corner is cut before the reader's eyes. */
  readonly justClosed?: boolean;
  readonly children?: ReactNode;
}

/** A sheet whose outline says whether it can still change. */
export const StateSheet = ({ state, words, justClosed = false, children }: StateSheetProps) => (
  <section className={`sheet-${state}${state === 'closed' && justClosed ? ' just-closed' : ''}`}>
    {words !== undefined && <p className="sheet-state">{words}</p>}
    {children}
  </section>
);

/** The same three states inside a table cell: a rule at the cell's start. */
export const StateRule = ({
  state,
  children,
}: {
  readonly state: SheetState;
  readonly children?: ReactNode;
}) => <span className={`state-${state}`}>{children}</span>;
