import { useState } from 'react';
import { cellWords, type JudgedCell } from '@/domain/paperwork/sheet/judge-cells';
import {
  placeKey,
  retyped,
  type SheetCell,
  sourceWords,
} from '@/domain/paperwork/sheet/sheet-cell';
import { Mark } from '../../look/Mark';

interface CellsToCorrectProps {
  readonly cells: readonly JudgedCell[];
  readonly onChange: (cell: SheetCell) => void;
}

const Editor = ({
  judged,
  onChange,
  onClose,
}: {
  readonly judged: JudgedCell;
  readonly onChange: (cell: SheetCell) => void;
  readonly onClose: () => void;
}) => {
  const [typed, setTyped] = useState(judged.cell.typed);
  const done = (cell: SheetCell) => {
    onChange(cell);
    onClose();
  };
  return (
    <form
      className="actions w-full pb-2"
      onSubmit={(event) => {
        event.preventDefault();
        done(retyped(judged.cell, typed));
      }}
    >
      <input
        className="input input-num"
        inputMode="decimal"
        autoComplete="off"
        // The person asked for this field by pressing Correct.
        ref={(field) => field?.focus()}
        aria-label={`${cellWords(judged.cell)}, in ${judged.cell.unit}`}
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
      />
      <span>{judged.cell.unit}</span>
      <button type="submit" className="btn">
        Take this
      </button>
      {judged.state === 'questioned' && (
        <button
          type="button"
          className="btn"
          onClick={() => done({ ...judged.cell, confirmed: true })}
        >
          It is so
        </button>
      )}
    </form>
  );
};

/** As many as are read one by one; of a whole column in the wrong unit nobody reads more. */
const AT_ONCE = 6;

/** Each cell that is no number or hardly meant, with the place, the words and the way to put it right. */
export const CellsToCorrect = ({ cells, onChange }: CellsToCorrectProps) => {
  const [open, setOpen] = useState<string>();
  const item = (judged: JudgedCell) => {
    const key = placeKey(judged.cell);
    const { source } = judged.cell;
    return (
      <li className="flex flex-wrap items-center gap-3 border-b border-hair py-2" key={key}>
        <Mark status="unreadable" />
        <span className="min-w-0 flex-1 basis-36">
          {judged.detail} {judged.remedy}
          {source !== undefined && (
            <span className="text-ink-2">
              {' '}
              In {sourceWords(source)} (cell {source.cell}).
            </span>
          )}
        </span>
        {open === key ? (
          <Editor judged={judged} onChange={onChange} onClose={() => setOpen(undefined)} />
        ) : (
          <button type="button" className="btn ml-auto" onClick={() => setOpen(key)}>
            Correct<span className="visually-hidden"> {cellWords(judged.cell)}</span>
          </button>
        )}
      </li>
    );
  };
  const rest = cells.slice(AT_ONCE);
  return (
    <>
      <ul>{cells.slice(0, AT_ONCE).map(item)}</ul>
      {rest.length > 0 && (
        <details>
          <summary className="min-h-12 cursor-pointer font-semibold">
            {rest.length} more to correct
          </summary>
          <ul>{rest.map(item)}</ul>
        </details>
      )}
    </>
  );
};
