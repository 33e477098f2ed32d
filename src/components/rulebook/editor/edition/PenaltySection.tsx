import type { Dispatch } from 'react';
import type { PlacedFault } from '../clause/FaultList';
import { type DraftAct, type DraftState, PENALTIES } from './draft-state';
import { PenaltyForm } from './PenaltyForm';

interface PenaltySectionProps {
  readonly state: Pick<DraftState, 'open' | 'penalties'>;
  readonly faults: readonly PlacedFault[];
  readonly act: Dispatch<DraftAct>;
}

/** The penalty schedule: to read, or open as a form. */
export const PenaltySection = ({ state, faults, act }: PenaltySectionProps) => {
  const { penalties } = state;
  const open = state.open === PENALTIES;
  return (
    <section className="penalty-schedule">
      <div className="section-head ruled">
        <h2>Penalty schedule</h2>
        <button
          type="button"
          className="btn"
          aria-expanded={open}
          onClick={() => act({ do: 'open', key: open ? undefined : PENALTIES })}
        >
          {open ? 'Close' : 'Edit the schedule'}
        </button>
      </div>
      {open ? (
        <PenaltyForm
          penalties={penalties}
          faults={faults}
          onChange={(next) => act({ do: 'penalties', penalties: next })}
        />
      ) : (
        <dl className="pairs">
          {penalties.map((row) => (
            <div className="contents" key={row.row}>
              <dt>Row {row.row}</dt>
              <dd>
                {row.breach}: {row.penalties.join('; then ')}
              </dd>
            </div>
          ))}
        </dl>
      )}
    </section>
  );
};
