import type { Part } from '../sheet/parts';

interface PartSwitchProps {
  readonly parts: readonly Part[];
  /** Absent: the checks. */
  readonly current: string | undefined;
  readonly onGo: (part: string) => void;
}

/** Parts with a button of their own; what is read once in a while stands in a list. */
const BUTTONS = ['checks', 'lifter-body-diameter', 'foot-diameter', 'tappet-bore-diameter'];

/** What is read at this bore: checks, lifter, foot, bore, and whatever else the rules ask. */
export const PartSwitch = ({ parts, current = 'checks', onGo }: PartSwitchProps) => {
  const all = [{ quantity: 'checks', label: 'Checks' }, ...parts];
  const others = all.filter(({ quantity }) => !BUTTONS.includes(quantity));
  return (
    <nav className="flex gap-2" aria-label="What is read">
      {all
        .filter(({ quantity }) => BUTTONS.includes(quantity))
        .map(({ quantity, label }) => (
          <button
            key={quantity}
            type="button"
            className={`btn flex-1 px-1 ${quantity === current ? 'btn-primary btn-compact' : ''}`}
            aria-current={quantity === current ? 'true' : undefined}
            onClick={() => onGo(quantity)}
          >
            {label}
          </button>
        ))}
      {others.length > 0 && (
        <select
          className="input min-w-0 flex-1 px-1"
          aria-label="What else is read"
          value={others.some(({ quantity }) => quantity === current) ? current : ''}
          onChange={(event) => event.target.value !== '' && onGo(event.target.value)}
        >
          <option value="">Other …</option>
          {others.map(({ quantity, label }) => (
            <option key={quantity} value={quantity}>
              {label}
            </option>
          ))}
        </select>
      )}
    </nav>
  );
};
