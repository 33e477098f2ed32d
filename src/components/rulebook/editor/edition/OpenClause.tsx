import type { Dispatch } from 'react';
import { ClauseForm } from '../clause/ClauseForm';
import type { PlacedFault } from '../clause/FaultList';
import type { DraftAct } from './draft-state';
import type { Row } from './numbering';

interface OpenClauseProps {
  readonly row: Row;
  readonly faults: readonly PlacedFault[];
  readonly penaltyRows: readonly string[];
  readonly act: Dispatch<DraftAct>;
}

/** The clause that is being written, as a form, and what can be done beside it in the tree. */
export const OpenClause = ({ row, faults, penaltyRows, act }: OpenClauseProps) => {
  const { key, clause } = row;
  const { number } = clause;
  const does: readonly (readonly [label: string, does: DraftAct])[] = [
    [`Close clause ${number}`, { do: 'open', key: undefined }],
    ['Add a clause at this level', { do: 'add', where: 'beside', key }],
    [`Add a clause below ${number}`, { do: 'add', where: 'under', key }],
    [`Remove clause ${number}`, { do: 'remove', key }],
  ];
  return (
    <li className="clause-open">
      <h3>
        <span className="num">{number}</span> {clause.heading}
      </h3>
      <ClauseForm
        clause={clause}
        faults={faults}
        penaltyRows={penaltyRows}
        onChange={(next) => act({ do: 'change', key, clause: next })}
        onRenumber={(next) => act({ do: 'renumber', key, number: next })}
      />
      <p className="actions">
        {does.map(([label, one]) => (
          <button key={one.do + label} type="button" className="btn" onClick={() => act(one)}>
            {label}
          </button>
        ))}
      </p>
    </li>
  );
};
