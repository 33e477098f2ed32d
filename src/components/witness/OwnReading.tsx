import { useState } from 'react';
import type { SentRemark } from '@/contracts/inspection/rows';
import { positionKey, type RemarkRow } from '@/domain/inspection/capture/rows';
import { parseWritten } from '@/domain/quantity/parse';
import { getQuantityEntry, isQuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import { displayNumber } from '../look/ReadingValue';
import { uuidV7 } from '../measuring/queue/uuid-v7';

interface OwnReadingProps {
  /** Quantities that the mandatory clauses ask for. */
  readonly quantities: readonly string[];
  readonly positions: readonly BorePosition[];
  readonly name: string;
  readonly kept: readonly RemarkRow[];
  readonly open: boolean;
  readonly record: (row: SentRemark) => Promise<void>;
}

const WHOLE = { bank: '', cylinder: '', valve: '' } as const;

const labelOf = (subject: string): string =>
  isQuantityName(subject) ? getQuantityEntry(subject).label : subject;

/** A reading of the competitor's own gauge or hand: written down beside the sheet, part of no result. */
export const OwnReading = ({
  quantities,
  positions,
  name,
  kept,
  open,
  record,
}: OwnReadingProps) => {
  const [quantity, setQuantity] = useState(quantities[0] ?? '');
  const [bore, setBore] = useState('');
  const [value, setValue] = useState('');
  const [whose, setWhose] = useState(name);
  const [problem, setProblem] = useState<string>();
  const unit = isQuantityName(quantity) ? getQuantityEntry(quantity).unit : '';
  const keep = async () => {
    const text = value.trim().replace(',', '.');
    const read = isQuantityName(quantity)
      ? parseWritten({ text, unit }, getQuantityEntry(quantity).dimension)
      : undefined;
    if (read === undefined || !read.ok)
      return setProblem(read?.failure.detail ?? 'Choose what was read.');
    if (whose.trim() === '') return setProblem('Name whose reading it is.');
    const position = positions.find((one) => boreName(one) === bore);
    try {
      await record({
        kind: 'remark',
        remark: 'own-reading',
        id: uuidV7(),
        occurredAt: new Date().toISOString(),
        place:
          position === undefined
            ? WHOLE
            : {
                bank: position.bank,
                cylinder: String(position.cylinder),
                valve: position.valve,
                ...(position.index === undefined ? {} : { index: position.index }),
              },
        subject: quantity,
        value: `${text} ${unit}`,
        reason: whose.trim(),
      });
      setValue('');
      setProblem(undefined);
    } catch {
      setProblem('This device did not keep it: its storage is closed or full. Write it down.');
    }
  };
  return (
    <div className="stack">
      {kept.length > 0 && (
        <ul className="list-rows" aria-label="Own readings">
          {kept.map((row) => (
            <li key={row.id}>
              <span className="grow">
                {labelOf(row.subject)}, {positionKey(row.place, 'bore')}: by {row.reason}
              </span>
              <b className="num">{displayNumber(row.answer.value ?? '')}</b>
            </li>
          ))}
        </ul>
      )}
      {open && (
        <details>
          <summary>Have your own reading written down</summary>
          <p className="note">
            It stands beside the inspector’s readings in the report and counts in no result.
          </p>
          {problem !== undefined && (
            <p className="field-error" id="own-error" role="alert">
              {problem}
            </p>
          )}
          <div className="field">
            <label htmlFor="own-quantity">What</label>
            <select
              id="own-quantity"
              value={quantity}
              onChange={(e) => setQuantity(e.target.value)}
            >
              {quantities.map((one) => (
                <option key={one} value={one}>
                  {labelOf(one)}
                </option>
              ))}
            </select>
          </div>
          <div className="field">
            <label htmlFor="own-bore">Where</label>
            <select id="own-bore" value={bore} onChange={(e) => setBore(e.target.value)}>
              <option value="">The engine</option>
              {positions.map((one) => (
                <option key={boreName(one)} value={boreName(one)}>
                  {boreName(one)}
                </option>
              ))}
            </select>
          </div>
          <div className="field">
            <label htmlFor="own-value">Read, in {unit === '1' ? 'figures' : unit}</label>
            <input
              className="input-num"
              id="own-value"
              inputMode="decimal"
              value={value}
              aria-invalid={problem === undefined ? undefined : true}
              aria-describedby={problem === undefined ? undefined : 'own-error'}
              onChange={(e) => setValue(e.target.value)}
            />
          </div>
          <div className="field">
            <label htmlFor="own-name">Whose reading</label>
            <input
              id="own-name"
              maxLength={120}
              value={whose}
              onChange={(e) => setWhose(e.target.value)}
            />
          </div>
          <p className="actions mt-3">
            <button className="btn" type="button" onClick={() => void keep()}>
              Write it down
            </button>
          </p>
        </details>
      )}
    </div>
  );
};
