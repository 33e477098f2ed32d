import type { ReadSheetAnswer } from '@/contracts/paperwork/sheet';
import {
  type ColumnMeaning,
  columnName,
  isUnexplained,
} from '@/domain/paperwork/sheet/header/column-meaning';
import { isOwnColumn } from '@/domain/paperwork/sheet/header/read-header';
import type { SheetForm } from '@/domain/rulebook/form/form';
import {
  type MeaningOption,
  meaningFor,
  meaningOptions,
  optionOf,
  SPOTS,
  spotOf,
  unitsOf,
  withSpot,
  withUnit,
} from './meanings';

interface ColumnsHeldProps {
  readonly sheet: Pick<ReadSheetAnswer, 'columns' | 'turned'>;
  readonly form: SheetForm;
  readonly onChoose: (key: string, meaning: ColumnMeaning) => void;
}

/** A choice of its own: what is chosen already cannot be chosen again. */
const UNSAID: MeaningOption = { value: '', words: 'say what it holds' };

interface ChoiceProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly MeaningOption[];
  readonly onChange: (value: string) => void;
}

const Choice = ({ label, value, options, onChange }: ChoiceProps) => (
  <select
    className="input"
    aria-label={label}
    value={value}
    onChange={(event) => onChange(event.target.value)}
  >
    {options.map((option) => (
      <option key={option.value} value={option.value}>
        {option.words}
      </option>
    ))}
  </select>
);

/** What each column of the file holds: found by its heading, or said once by the person and remembered. */
export const ColumnsHeld = ({ sheet, form, onChoose }: ColumnsHeldProps) => {
  const { columns, turned } = sheet;
  const open = columns.filter(isUnexplained);
  const options = meaningOptions(form);
  // A lobe has one lift at an angle.
  const hasSpots = form.per !== 'degree';
  const line = turned ? 'Row' : 'Column';
  const nameOf = (at: number) => (turned ? String(at + 1) : columnName(at));
  return (
    <details className="my-3" open={open.length > 0}>
      <summary className="min-h-12 cursor-pointer font-semibold">
        What the {turned ? 'rows' : 'columns'} hold:{' '}
        {open.length === 0 ? 'all known' : `${open.length} to say`}
      </summary>
      <p>What you say is remembered: the next sheet of yours with these headings reads itself.</p>
      <table className="table-stack">
        <thead>
          <tr>
            <th scope="col">{line}</th>
            <th scope="col">First values</th>
            <th scope="col">Holds</th>
            <th scope="col">Unit</th>
            {hasSpots ? <th scope="col">Where</th> : <td />}
          </tr>
        </thead>
        <tbody>
          {columns
            .filter(({ samples, header }) => samples.length > 0 && !isOwnColumn(header))
            .map((column) => {
              const { at, key, header, meaning, samples } = column;
              const name = header === '' ? `${line} ${nameOf(at)}` : header;
              const unexplained = isUnexplained(column);
              const reading = meaning.kind === 'reading' ? meaning : undefined;
              return (
                <tr key={key} className={unexplained ? 'row-close' : undefined}>
                  <th scope="row" data-label={`${line} ${nameOf(at)}`}>
                    {name}
                  </th>
                  <td data-label="First values">{samples.join(' · ')}</td>
                  <td data-label="Holds">
                    <Choice
                      label={`${name} holds`}
                      value={unexplained ? '' : optionOf(meaning)}
                      options={unexplained ? [UNSAID, ...options] : options}
                      onChange={(value) => onChoose(key, meaningFor(value, form, header))}
                    />
                  </td>
                  <td data-label={reading && 'Unit'}>
                    {reading && (
                      <Choice
                        label={`Unit of ${name}`}
                        value={reading.unit}
                        options={unitsOf(reading).map((unit) => ({ value: unit, words: unit }))}
                        onChange={(unit) => onChoose(key, withUnit(reading, unit))}
                      />
                    )}
                  </td>
                  <td data-label={reading && hasSpots && 'Where'}>
                    {reading && hasSpots && (
                      <Choice
                        label={`Where ${name} was measured`}
                        value={
                          SPOTS.some(({ value }) => value === spotOf(reading))
                            ? spotOf(reading)
                            : ''
                        }
                        options={SPOTS}
                        onChange={(spot) => onChoose(key, withSpot(reading, spot))}
                      />
                    )}
                  </td>
                </tr>
              );
            })}
        </tbody>
      </table>
    </details>
  );
};
