import { useState } from 'react';
import type { CheckRequest, ChecksShown } from '@/contracts/event/check';

interface CorrectGaugeProps {
  readonly car: string;
  /** Those it may have been read on instead. */
  readonly gauges: ChecksShown['gauges'];
  readonly busy: boolean;
  readonly onCorrect: (said: Pick<CheckRequest, 'correction' | 'gaugeId'>) => void;
}

/** The reading stays as it was typed; the gauge under which it was written down is corrected, with why. */
export const CorrectGauge = ({ car, gauges, busy, onCorrect }: CorrectGaugeProps) => {
  const [gaugeId, choose] = useState(gauges[0]?.id ?? '');
  const [correction, setCorrection] = useState('');
  return (
    <details>
      <summary>
        Another gauge<span className="visually-hidden">, car {car}</span>
      </summary>
      <form
        className="actions"
        onSubmit={(event) => {
          event.preventDefault();
          onCorrect({ gaugeId, correction });
        }}
      >
        <select
          className="input"
          aria-label={`Which gauge it was, car ${car}`}
          value={gaugeId}
          onChange={(event) => choose(event.target.value)}
        >
          {gauges.map(({ id, code, name }) => (
            <option key={id} value={id}>
              {code}, {name}
            </option>
          ))}
        </select>
        <input
          className="input"
          maxLength={300}
          aria-label={`Why the gauge is corrected, car ${car}`}
          value={correction}
          onChange={(event) => setCorrection(event.target.value)}
        />
        <button type="submit" className="btn" disabled={busy}>
          Correct the gauge
        </button>
      </form>
    </details>
  );
};
