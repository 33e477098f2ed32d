import { useState } from 'react';
import type { LoggedTemperatures } from '@/domain/inspection/capture/rows';
import { parseQuantity } from '@/domain/quantity/parse';

/** A temperature as it is read, with its unit; taken when the field is left. */
export const Temperature = ({
  id,
  label,
  given,
  onGive,
}: {
  readonly id: string;
  readonly label: string;
  readonly given: LoggedTemperatures['bore'];
  readonly onGive: (value: LoggedTemperatures['bore']) => void;
}) => {
  const [text, setText] = useState(given === undefined ? '' : `${given.text} ${given.unit}`);
  const [fault, setFault] = useState<string>();
  const take = () => {
    if (text.trim() === '') {
      setFault(undefined);
      onGive(undefined);
      return;
    }
    const read = parseQuantity(text, { dimension: 'temperature' });
    setFault(read.ok ? undefined : read.failure.detail);
    if (read.ok) onGive({ text: read.value.text, unit: read.value.unit });
  };
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      {fault !== undefined && <p className="field-error">{fault}</p>}
      <input
        id={id}
        className="input-num"
        inputMode="text"
        placeholder="74 °F"
        value={text}
        aria-invalid={fault === undefined ? undefined : 'true'}
        onChange={(event) => setText(event.target.value)}
        onBlur={take}
      />
    </div>
  );
};
