import type { ClauseChange } from '@/domain/rulebook/bulletin';
import type { Clause } from '@/domain/rulebook/clause';
import { requirementWords } from '@/domain/rulebook/describe';
import { ClauseForm } from '../clause/ClauseForm';
import type { PlacedFault } from '../clause/FaultList';

const VERB = {
  add: 'New clause',
  replace: 'Replaces clause',
  withdraw: 'Withdraws clause',
} as const;

interface ChangeItemProps {
  readonly change: ClauseChange;
  /** The clause in force, where there is one. */
  readonly before: Clause | undefined;
  readonly faults: readonly PlacedFault[];
  readonly open: boolean;
  readonly penaltyRows: readonly string[];
  readonly onOpen: () => void;
  readonly onChange: (change: ClauseChange) => void;
  readonly onRemove: () => void;
}

const Before = ({ clause }: { readonly clause: Clause }) => (
  <div className="in-force">
    <p className="note">In force now</p>
    <p>{clause.words}</p>
    {clause.requirement && <p className="note">{requirementWords(clause.requirement)}</p>}
  </div>
);

/** One change of a bulletin beside the clause as it is in force. */
export const ChangeItem = ({ change, before, faults, open, ...props }: ChangeItemProps) => {
  const { penaltyRows, onOpen, onChange, onRemove } = props;
  const number = change.kind === 'withdraw' ? change.number : change.clause.number;
  const heading = change.kind === 'withdraw' ? before?.heading : change.clause.heading;
  return (
    <li className={open ? 'clause-open' : undefined}>
      <div className="split">
        <h3>
          {VERB[change.kind]} <span className="num">{number}</span> {heading}
        </h3>
        <span className="actions">
          {faults.length > 0 && <span>{faults.length} still ambiguous</span>}
          {change.kind !== 'withdraw' && (
            <button type="button" className="btn" aria-expanded={open} onClick={onOpen}>
              {open ? 'Close' : 'Edit'}
            </button>
          )}
          <button type="button" className="btn" onClick={onRemove}>
            Take this change out
          </button>
        </span>
      </div>
      {change.kind === 'withdraw' &&
        faults.map((fault) => (
          <p className="field-error" key={fault.detail}>
            {fault.detail}
          </p>
        ))}
      {before && change.kind !== 'add' && <Before clause={before} />}
      {open && change.kind !== 'withdraw' && (
        <ClauseForm
          clause={change.clause}
          faults={faults}
          penaltyRows={penaltyRows}
          onChange={(clause) => onChange({ ...change, clause })}
          {...(change.kind === 'add' && {
            onRenumber: (next: string) =>
              onChange({ ...change, clause: { ...change.clause, number: next } }),
          })}
        />
      )}
    </li>
  );
};
