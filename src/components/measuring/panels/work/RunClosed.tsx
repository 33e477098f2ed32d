import { Caution } from '@/components/look/Caution';
import { displayNumber } from '@/components/look/ReadingValue';
import type { RunOutcome } from '@/domain/inspection/measure/run-outcome';

/** What came of a closing zero: the drift that is shared out, or the bores to read again. */
export const RunClosed = ({
  run,
  unit,
  onRedo,
  onLater,
}: {
  readonly run: RunOutcome | undefined;
  /** As it stands over the keys. */
  readonly unit: string;
  readonly onRedo: () => void;
  readonly onLater: () => void;
}) => {
  if (run === undefined) return <p role="status">The closing zero is being worked out.</p>;
  const drift = displayNumber(run.drift.text, true);
  if (run.held)
    return (
      <div role="status">
        <Caution status="within" title="The zero held">
          <p>
            It moved by {drift} × {unit}, shared over the run in taking order. Enter alone: seen.
          </p>
        </Caution>
      </div>
    );
  return (
    <div role="alert">
      <Caution status="outside" title="The zero moved too far">
        <p>
          By {drift} × {unit}; a quarter of the window is {displayNumber(run.allowed.text)}. To be
          read again: {run.bores.join(', ')}. What was read stays on record, struck: zero moved.
        </p>
        <div className="actions">
          <button className="btn btn-primary btn-compact" type="button" onClick={onRedo}>
            Read {run.bores.length} {run.bores.length === 1 ? 'bore' : 'bores'} again
          </button>
          <button className="btn" type="button" onClick={onLater}>
            Later
          </button>
        </div>
      </Caution>
    </div>
  );
};
