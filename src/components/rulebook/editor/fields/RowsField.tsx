import type { ReactNode } from 'react';

interface RowsFieldProps<T> {
  readonly rows: readonly T[];
  /** What one row is called, `option`. */
  readonly one: string;
  readonly fresh: T;
  readonly onChange: (rows: readonly T[]) => void;
  readonly show: (row: T, change: (row: T) => void, index: number) => ReactNode;
}

/** Rows that can be added and taken away. */
export const RowsField = <T,>({ rows, one, fresh, onChange, show }: RowsFieldProps<T>) => {
  // Rows have no name of their own; they stay in their places.
  const places = Array.from(rows, (_, index) => `${one} ${index + 1}`);
  return (
    <div className="rows-field">
      {rows.map((row, index) => (
        <div className="rows-field-row" key={places[index]}>
          {show(row, (changed) => onChange(rows.with(index, changed)), index)}
          <button
            type="button"
            className="btn"
            onClick={() => onChange(rows.toSpliced(index, 1))}
            aria-label={`Take away ${one} ${index + 1}`}
          >
            Take away
          </button>
        </div>
      ))}
      <button type="button" className="btn" onClick={() => onChange([...rows, fresh])}>
        Add {/^[aeiou]/.test(one) ? 'an' : 'a'} {one}
      </button>
    </div>
  );
};
