import type { Dimension, Written } from '@/domain/quantity/dimension';
import { unitSymbols } from '@/domain/quantity/find-unit';
import { Around, fieldId, useFaultsAt } from './faults';

interface WrittenFieldProps {
  readonly at: string;
  readonly label: string;
  readonly hint?: string;
  readonly dimension: Dimension;
  /** The unit that a number begins with. */
  readonly unit: string;
  readonly value: Written | undefined;
  /** Emptied, the number is not stated. */
  readonly onChange: (value: Written | undefined) => void;
}

const unitName = (symbol: string): string => (symbol === '1' ? 'no unit' : symbol);

/** A number as it is written, kept as typed, with its unit. */
export const WrittenField = ({ at, label, hint, dimension, unit, ...rest }: WrittenFieldProps) => {
  const { value, onChange } = rest;
  const faults = [...useFaultsAt(at), ...useFaultsAt(`${at}/text`), ...useFaultsAt(`${at}/unit`)];
  const id = fieldId(at);
  const here = value?.unit ?? unit;
  const units = unitSymbols(dimension);
  return (
    <Around at={at} label={label} hint={hint} faults={faults}>
      <span className="written">
        <input
          id={id}
          type="text"
          inputMode="decimal"
          className="input input-num"
          maxLength={60}
          aria-invalid={faults.length > 0 ? 'true' : undefined}
          aria-describedby={faults.length > 0 ? `${id}:error` : hint && `${id}:hint`}
          value={value?.text ?? ''}
          onChange={(event) =>
            onChange(
              event.target.value === '' ? undefined : { text: event.target.value, unit: here },
            )
          }
        />
        <select
          className="input"
          aria-label={`Unit of ${label}`}
          value={here}
          onChange={(event) => onChange({ text: value?.text ?? '', unit: event.target.value })}
        >
          {[...new Set([...units, here])].map((symbol) => (
            <option key={symbol} value={symbol}>
              {unitName(symbol)}
            </option>
          ))}
        </select>
      </span>
    </Around>
  );
};
