import type { Part } from '../sheet/parts';

interface PartSwitchProps {
  readonly parts: readonly Part[];
  /** Absent: the checks. */
  readonly current: string | undefined;
  readonly onGo: (part: string) => void;
}

/** What is read at this bore: checks, lifter, foot, bore, and whatever else the rules ask. */
export const PartSwitch = ({ parts, current, onGo }: PartSwitchProps) => {
  const all = [{ quantity: 'checks', label: 'Checks' }, ...parts];
  return (
    <nav className="flex flex-wrap gap-2" aria-label="What is read">
      {all.map(({ quantity, label }) => {
        const isCurrent = quantity === (current ?? 'checks');
        return (
          <button
            key={quantity}
            type="button"
            className={isCurrent ? 'btn btn-primary btn-compact px-3' : 'btn px-3'}
            aria-current={isCurrent ? 'true' : undefined}
            onClick={() => onGo(quantity)}
          >
            {label}
          </button>
        );
      })}
    </nav>
  );
};
