import { useState } from 'react';
import type {
  CheckedShown,
  CheckRequest,
  ChecksShown,
  LineCheckShown,
} from '@/contracts/event/check';
import { clockWords } from '@/domain/verdict/instant-words';
import { CarPlate } from '../../look/CarPlate';
import { StatusWord } from '../../look/StatusWord';
import { CorrectGauge } from './CorrectGauge';

interface CheckRowProps {
  readonly car: ChecksShown['cars'][number];
  readonly ask: LineCheckShown['ask'];
  readonly checked: CheckedShown | undefined;
  readonly records: boolean;
  readonly gauges: ChecksShown['gauges'];
  /** The event's: times are read off the track's clocks. */
  readonly zone: string;
  /** Gives what there is to say about it, where there is anything. */
  readonly send: (
    said: Pick<CheckRequest, 'answer' | 'value' | 'takeBack' | 'correction' | 'gaugeId'>,
  ) => Promise<{ readonly refused: boolean; readonly words: string } | undefined>;
}

const STATUS = {
  within: ['within', 'Passed'],
  outside: ['outside', 'Not passed'],
  'no-statement': ['set-aside', 'No statement'],
} as const;

/** One car and one check: a tap, or a value and Enter. */
export const CheckRow = ({ car, ask, checked, records, gauges, zone, send }: CheckRowProps) => {
  const [text, setText] = useState('');
  const [reason, setReason] = useState('');
  const [busy, setBusy] = useState(false);
  const [words, setWords] = useState<Awaited<ReturnType<CheckRowProps['send']>>>();
  const say = async (said: Parameters<typeof send>[0]) => {
    setBusy(true);
    setWords(await send(said));
    setBusy(false);
  };
  const [status, word] = checked === undefined ? [undefined, ''] : STATUS[checked.state];
  return (
    <li className="flex-wrap">
      <CarPlate number={car.carNumber} />
      {records && ask.kind === 'answer' && (
        <fieldset className="actions">
          <legend className="visually-hidden">Car {car.carNumber}</legend>
          {ask.answers.map(({ value, label }) => (
            <button
              key={value}
              type="button"
              className="btn"
              disabled={busy}
              aria-pressed={checked?.answer === value}
              onClick={() => void say({ answer: value })}
            >
              {label}
            </button>
          ))}
        </fieldset>
      )}
      {records && ask.kind === 'value' && (
        <form
          className="actions"
          onSubmit={(event) => {
            event.preventDefault();
            if (text.trim() === '') return;
            void say({ value: { text: text.trim(), unit: ask.unit } }).then(() => setText(''));
          }}
        >
          <input
            className="input input-num"
            inputMode="decimal"
            maxLength={20}
            aria-label={`Car ${car.carNumber}, ${ask.unit}`}
            value={text}
            onChange={(event) => setText(event.target.value)}
          />
          <span>{ask.unit}</span>
          <button type="submit" className="btn" disabled={busy}>
            Enter
          </button>
        </form>
      )}
      <span className="grow basis-80" aria-live="polite">
        {checked !== undefined && status !== undefined && (
          <>
            <StatusWord
              status={status}
              word={word}
              detail={`${checked.value === null ? '' : `${checked.value.text} ${checked.value.unit}, ${checked.gauge ?? ''}. `}${clockWords(checked.at, zone)}, ${checked.by}${checked.correctedBecause === '' ? '' : `. Gauge corrected: ${checked.correctedBecause}`}`}
            />
            {checked.state !== 'within' && <span className="note">{checked.sentence}</span>}
          </>
        )}
        {checked === undefined && <span className="note">Not checked yet</span>}
        {words !== undefined && (
          <span className={words.refused ? 'field-error' : 'note'}> {words.words}</span>
        )}
      </span>
      {car.inspectionId !== null && (
        <a href={`/barn/inspections/${car.inspectionId}`}>
          <span className="visually-hidden">Car {car.carNumber}: </span>inspection
        </a>
      )}
      {records && checked?.value != null && gauges.length > 1 && (
        <CorrectGauge
          key={checked.id}
          car={car.carNumber}
          gauges={gauges.filter(({ code }) => code !== checked.gauge)}
          busy={busy}
          onCorrect={(said) => void say(said)}
        />
      )}
      {records && checked !== undefined && (
        <details>
          <summary>
            Take back<span className="visually-hidden">, car {car.carNumber}</span>
          </summary>
          <form
            className="actions"
            onSubmit={(event) => {
              event.preventDefault();
              void say({ takeBack: reason });
            }}
          >
            <input
              className="input"
              maxLength={300}
              aria-label={`Why it is taken back, car ${car.carNumber}`}
              value={reason}
              onChange={(event) => setReason(event.target.value)}
            />
            <button type="submit" className="btn" disabled={busy}>
              Take it back
            </button>
          </form>
        </details>
      )}
    </li>
  );
};
