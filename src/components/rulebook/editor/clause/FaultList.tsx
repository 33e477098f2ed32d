import { memo } from 'react';

export interface PlacedFault {
  /** Of the row that the fault is in; absent where it is in none. */
  readonly key: string | undefined;
  /** The clause's number, or what the place is called. */
  readonly place: string;
  /** Within the row. */
  readonly pointer: string;
  readonly detail: string;
}

interface FaultListProps {
  readonly faults: readonly PlacedFault[];
  /** What can be done once there are none. */
  readonly sound: string;
  readonly onGo: (fault: PlacedFault) => void;
}

/** What keeps the draft from being published; each line leads to its field. */
export const FaultList = memo(({ faults, sound, onGo }: FaultListProps) => (
  <section className="fault-list" aria-label="Ambiguous">
    <h2>{faults.length === 0 ? 'Nothing is ambiguous' : `Still ambiguous: ${faults.length}`}</h2>
    {faults.length === 0 && <p className="note">{sound}</p>}
    <ul>
      {faults.map((fault) => (
        <li key={`${fault.key} ${fault.pointer} ${fault.detail}`}>
          <button type="button" className="btn-link" onClick={() => onGo(fault)}>
            <span className="num">{fault.place}</span> {fault.detail}
          </button>
        </li>
      ))}
    </ul>
  </section>
));
