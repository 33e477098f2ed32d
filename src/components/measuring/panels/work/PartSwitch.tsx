import type { Part } from '../../sheet/parts';

interface PartSwitchProps {
  readonly parts: readonly Part[];
  /** A part's key, `checks` or `rack`. */
  readonly current: string;
  readonly onGo: (part: string) => void;
}

/** Parts with a button of their own; what is read once in a while stands in a list. */
const BUTTONS = ['checks', 'lifter-body-diameter', 'foot-diameter', 'tappet-bore-diameter'];

/** What is read at this bore: checks, lifter, foot, bore, the rack, and whatever else the rules ask. */
export const PartSwitch = ({ parts, current, onGo }: PartSwitchProps) => {
  const all = [
    { key: 'checks', label: 'Checks' },
    ...parts,
    { key: 'rack', label: 'Rack of lifters' },
  ];
  const others = all.filter(({ key }) => !BUTTONS.includes(key));
  return (
    <nav className="part-switch" aria-label="What is read">
      {all
        .filter(({ key }) => BUTTONS.includes(key))
        .map(({ key, label }) => (
          <button
            key={key}
            type="button"
            className={`btn ${key === current ? 'btn-primary btn-compact' : ''}`}
            aria-current={key === current ? 'true' : undefined}
            onClick={() => onGo(key)}
          >
            {label}
          </button>
        ))}
      <select
        className="input"
        aria-label="What else is read"
        value={others.some(({ key }) => key === current) ? current : ''}
        onChange={(event) => {
          if (event.target.value !== '') onGo(event.target.value);
          // The keys belong to the number again.
          event.target.blur();
        }}
      >
        <option value="">Other</option>
        {others.map(({ key, label }) => (
          <option key={key} value={key}>
            {label}
          </option>
        ))}
      </select>
    </nav>
  );
};
