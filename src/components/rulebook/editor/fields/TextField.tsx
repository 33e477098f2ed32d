import { useState } from 'react';
import { Around, useDescribed } from './faults';

interface TextFieldProps {
  readonly at: string;
  readonly label: string;
  readonly hint?: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly long?: boolean;
  readonly num?: boolean;
  readonly maxLength?: number;
}

export const TextField = ({ at, label, hint, value, onChange, ...props }: TextFieldProps) => {
  const { long = false, num = false, maxLength = long ? 20_000 : 200 } = props;
  const shared = {
    ...useDescribed(at, hint),
    value,
    maxLength,
    className: num ? 'input-num' : undefined,
    onChange: (event: { readonly target: { readonly value: string } }) =>
      onChange(event.target.value),
  };
  return (
    <Around at={at} label={label} hint={hint}>
      {long ? <textarea rows={4} {...shared} /> : <input type="text" {...shared} />}
    </Around>
  );
};

interface ReadFieldProps<T> {
  readonly at: string;
  readonly label: string;
  readonly hint?: string;
  readonly value: T;
  readonly show: (value: T) => string;
  /** What was typed as a value, or nothing while it is none. */
  readonly read: (text: string) => T | undefined;
  readonly refused: string;
  readonly onChange: (value: T) => void;
  readonly num?: boolean;
}

/** Text that must be read before it counts; what cannot be read stays as typed, and is said. */
export const ReadField = <T,>({
  at,
  label,
  hint,
  value,
  show,
  read,
  ...rest
}: ReadFieldProps<T>) => {
  const [typed, setTyped] = useState<string>();
  const { refused, onChange, num = false } = rest;
  const wrong = typed !== undefined && read(typed) === undefined;
  const described = useDescribed(at, hint);
  const leave = () => {
    const found = typed === undefined ? undefined : read(typed);
    if (found !== undefined) {
      if (show(found) !== show(value)) onChange(found);
      setTyped(undefined);
    }
  };
  return (
    <Around at={at} label={label} hint={hint}>
      {wrong && <p className="field-error">{refused}</p>}
      <input
        type="text"
        {...described}
        aria-invalid={wrong ? 'true' : described['aria-invalid']}
        className={num ? 'input-num' : undefined}
        value={typed ?? show(value)}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={leave}
        onKeyDown={(event) => event.key === 'Enter' && leave()}
      />
    </Around>
  );
};

const whole = (text: string): number | undefined =>
  /^-?\d{1,6}$/.test(text.trim()) ? Number(text) : undefined;

export const WholeField = (
  props: Omit<ReadFieldProps<number>, 'show' | 'read' | 'refused' | 'num'>,
) => <ReadField {...props} show={String} read={whole} refused="Write a whole number." num />;
