import { type Dispatch, useState } from 'react';
import { ClauseRow } from './ClauseRow';
import type { DraftAct, DraftState } from './draft-state';
import type { Row } from './numbering';
import { OpenClause } from './OpenClause';
import { type FaultsByRow, faultsOf } from './place-faults';

interface ClauseListProps {
  readonly state: DraftState;
  readonly faults: FaultsByRow;
  readonly penaltyRows: readonly string[];
  readonly act: Dispatch<DraftAct>;
  /** Opens a clause and goes to its first field. */
  readonly onOpen: (key: string) => void;
}

const holds = ({ clause }: Row, wanted: string): boolean =>
  `${clause.number} ${clause.heading} ${clause.words}`.toLowerCase().includes(wanted);

/** The tree of clauses, to be searched, with one of them open as a form. */
export const ClauseList = ({ state, faults, penaltyRows, act, onOpen }: ClauseListProps) => {
  const { rows, open, removed } = state;
  const [find, setFind] = useState('');
  const wanted = find.trim().toLowerCase();
  const shown = wanted === '' ? rows : rows.filter((row) => row.key === open || holds(row, wanted));
  return (
    <>
      <div className="field">
        <label htmlFor="draft-find">Find in {rows.length} clauses</label>
        <input
          id="draft-find"
          type="search"
          value={find}
          onChange={(event) => setFind(event.target.value)}
        />
      </div>
      {removed && (
        <p className="actions" role="status">
          <span>Clause {removed.clause.number} was removed.</span>
          <button type="button" className="btn" onClick={() => act({ do: 'put-back' })}>
            Put it back
          </button>
        </p>
      )}
      <ol className="clause-list">
        {shown.map((row) => {
          const here = faultsOf(faults, row.key);
          return row.key === open ? (
            <OpenClause key={row.key} row={row} faults={here} penaltyRows={penaltyRows} act={act} />
          ) : (
            <ClauseRow key={row.key} row={row} faults={here.length} onOpen={onOpen} />
          );
        })}
      </ol>
      <p className="actions">
        <button type="button" className="btn" onClick={() => act({ do: 'add', where: 'end' })}>
          Add a clause
        </button>
      </p>
    </>
  );
};
