import { useState } from 'react';
import type { SentRow } from '@/contracts/inspection/rows';
import { inTakingOrder, type RemarkRow } from '@/domain/inspection/capture/rows';
import type { Clause } from '@/domain/rulebook/clause';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { checksOf } from '../sheet/parts';
import { checkRow } from '../sheet/rows';
import { placeOf, type Sheet, samePlace } from '../sheet/sheet';

interface ChecksPanelProps {
  readonly sheet: Sheet;
  readonly position: BorePosition;
  readonly remarks: readonly RemarkRow[];
  readonly record: (rows: readonly SentRow[]) => Promise<boolean>;
}

type Check = NonNullable<Clause['requirement']>;

const answersOf = (check: Check): readonly { readonly value: string; readonly label: string }[] => {
  switch (check.kind) {
    case 'choice':
      return check.options;
    case 'yes-no':
      return [
        { value: 'yes', label: 'Yes' },
        { value: 'no', label: 'No' },
      ];
    case 'plug-gauge':
      return [
        { value: 'goes', label: 'Goes' },
        { value: 'does-not-go', label: 'Does not go' },
      ];
    default:
      return [];
  }
};

const questionOf = (check: Check): string => {
  if (check.kind === 'plug-gauge')
    return `${check.gauge === 'go' ? 'Go' : 'No-go'} gauge ${check.size.text} ${check.size.unit}, ${check.where}`;
  return 'question' in check ? check.question : '';
};

const Text = ({
  given,
  onGive,
}: {
  readonly given: string;
  readonly onGive: (text: string) => void;
}) => {
  const [text, setText] = useState(given);
  return (
    <form
      className="actions"
      onSubmit={(event) => {
        event.preventDefault();
        if (text.trim() !== '') onGive(text.trim());
      }}
    >
      <input
        className="input flex-1"
        aria-label="As found"
        value={text}
        maxLength={200}
        onChange={(event) => setText(event.target.value)}
      />
      <button className="btn" type="submit">
        Keep
      </button>
    </form>
  );
};

/** The checks without numbers: for this bore, and once for the whole engine. */
export const ChecksPanel = ({ sheet, position, remarks, record }: ChecksPanelProps) => (
  <div className="grid gap-5">
    <h2>Checks at {boreName(position)}, and for the engine</h2>
    {checksOf(sheet.rules).map((clause) => {
      const check = clause.requirement;
      if (check === undefined || !('subject' in check) || !('per' in check)) return null;
      const per = check.per === 'lifter' ? 'bore' : check.per;
      const place = placeOf(position, per);
      const given = inTakingOrder(remarks).findLast(
        (row) =>
          row.kind === 'check' && row.subject === check.subject && samePlace(row.place, place),
      )?.answer.value;
      const give = (value: string) => void record([checkRow(place, check.subject, value)]);
      const answers = answersOf(check);
      return (
        <fieldset key={`${clause.number} ${per === 'engine' ? '' : boreName(position)}`}>
          <legend>
            <span className="finding-clause">{clause.number}</span> {questionOf(check)}{' '}
            <span className="note">
              {per === 'engine' || per === 'car'
                ? 'whole engine'
                : per === 'cylinder'
                  ? `cylinder ${position.cylinder}`
                  : boreName(position)}
            </span>
          </legend>
          {answers.length === 0 ? (
            <Text given={given ?? ''} onGive={give} />
          ) : (
            <div className="actions">
              {answers.map(({ value, label }) => (
                <button
                  key={value}
                  type="button"
                  className={given === value ? 'btn btn-primary btn-compact' : 'btn'}
                  aria-pressed={given === value}
                  onClick={() => give(value)}
                >
                  {label}
                </button>
              ))}
            </div>
          )}
        </fieldset>
      );
    })}
  </div>
);
