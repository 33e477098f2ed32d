import { Around, useDescribed } from './faults';

export interface Offered {
  readonly value: string;
  readonly label: string;
  readonly group?: string;
}

interface SelectFieldProps {
  readonly at: string;
  readonly label: string;
  readonly hint?: string | undefined;
  readonly value: string;
  readonly options: readonly Offered[];
  readonly onChange: (value: string) => void;
}

const optionsOf = (options: readonly Offered[]) =>
  options.map(({ value, label }) => (
    <option key={value} value={value}>
      {label}
    </option>
  ));

export const SelectField = ({ at, label, hint, value, options, onChange }: SelectFieldProps) => {
  const groups = [...new Set(options.map((option) => option.group))];
  return (
    <Around at={at} label={label} hint={hint}>
      <select
        {...useDescribed(at, hint)}
        value={value}
        onChange={(event) => onChange(event.target.value)}
      >
        {groups.map((group) => {
          const here = optionsOf(options.filter((option) => option.group === group));
          return group === undefined ? (
            here
          ) : (
            <optgroup key={group} label={group}>
              {here}
            </optgroup>
          );
        })}
      </select>
    </Around>
  );
};

export const CheckField = ({
  label,
  checked,
  onChange,
}: {
  readonly label: string;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
}) => (
  <label className="choice">
    <input type="checkbox" checked={checked} onChange={(event) => onChange(event.target.checked)} />
    {label}
  </label>
);
