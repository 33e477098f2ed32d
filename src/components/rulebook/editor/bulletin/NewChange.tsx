import { useState } from 'react';
import type { ClauseChange } from '@/domain/rulebook/bulletin';
import type { Clause } from '@/domain/rulebook/clause';
import { numberBeside } from '../edition/numbering';

interface NewChangeProps {
  readonly clauses: readonly Clause[];
  readonly changes: readonly ClauseChange[];
  readonly onAdd: (change: ClauseChange) => void;
}

/** Starts a change: a clause in force is taken over as it stands, to be changed. */
export const NewChange = ({ clauses, changes, onAdd }: NewChangeProps) => {
  const touched = new Set(
    changes.map((change) => (change.kind === 'withdraw' ? change.number : change.clause.number)),
  );
  const free = clauses.filter((clause) => !touched.has(clause.number));
  const [chosen, setChosen] = useState('');
  const clause = free.find((one) => one.number === chosen) ?? free[0];
  const addNew = () => {
    const numbers = [...clauses.map((one) => one.number), ...touched];
    const rows = numbers.map((number) => ({
      key: number,
      clause: { number, heading: '', words: '', force: 'text' as const },
    }));
    const number = numberBeside(rows, clause?.number);
    onAdd({ kind: 'add', clause: { number, heading: '', words: '', force: 'text' } });
  };
  return (
    <div className="field">
      <label htmlFor="new-change">Clause in force</label>
      <select
        id="new-change"
        value={clause?.number ?? ''}
        onChange={(event) => setChosen(event.target.value)}
      >
        {free.map(({ number, heading }) => (
          <option key={number} value={number}>
            {number} {heading}
          </option>
        ))}
      </select>
      <span className="actions">
        <button
          type="button"
          className="btn"
          disabled={clause === undefined}
          onClick={() => clause && onAdd({ kind: 'replace', clause })}
        >
          Change this clause
        </button>
        <button
          type="button"
          className="btn"
          disabled={clause === undefined}
          onClick={() => clause && onAdd({ kind: 'withdraw', number: clause.number })}
        >
          Withdraw it
        </button>
        <button type="button" className="btn" onClick={addNew}>
          Add a new clause beside it
        </button>
      </span>
    </div>
  );
};
