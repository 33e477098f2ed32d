import { useRef } from 'react';
import type { ReadSheetAnswer } from '@/contracts/paperwork/sheet';
import { boreMarks } from '@/domain/paperwork/bore-marks';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { placeKey, type SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { BoreMap } from '../../../tappet/BoreMap';
import type { ShownFile } from '../../paperwork-props';
import { CellsToCorrect } from '../CellsToCorrect';
import { LiftCurve } from '../cam/LiftCurve';
import { liftsOf } from '../cam/lifts-of';
import { type GridHandle, ValuesGrid } from '../grid/ValuesGrid';
import { boreStates } from '../marks';

interface ImportPreviewProps {
  readonly file: ShownFile;
  readonly sheet: ReadSheetAnswer;
  /** As read, with what was put right here. */
  readonly cells: readonly SheetCell[];
  /** What the form holds now. */
  readonly held: readonly SheetCell[];
  readonly form: SheetForm;
  readonly layout: BoreLayout;
  readonly onChange: (cell: SheetCell) => void;
  readonly onConfirm: () => void;
}

/** How many values of the form these would replace by others. */
const replaced = (cells: readonly SheetCell[], held: readonly SheetCell[]): number => {
  const before = new Map(held.map((cell) => [placeKey(cell), cell]));
  return cells.filter((cell) => {
    const known = before.get(placeKey(cell));
    return (
      known !== undefined &&
      known.typed !== '' &&
      `${known.typed} ${known.unit}` !== `${cell.typed} ${cell.unit}`
    );
  }).length;
};

const counted = (count: number, one: string, many: string): string =>
  `${count} ${count === 1 ? one : many}`;

/** What a file says, before it counts: bore by bore, cell by cell, with what is to be put right. */
export const ImportPreview = (props: ImportPreviewProps) => {
  const { file, sheet, cells, held, form, layout, onChange, onConfirm } = props;
  const grid = useRef<GridHandle>(null);
  const judged = judgeCells(cells);
  const wrong = judged.filter(({ state }) => state !== 'ok');
  const good = judged.length - wrong.length;
  const changes = replaced(cells, held);
  const byBore = form.per === 'bore' || form.per === 'lifter';
  // Bore by bore, as far as the file goes: what it has no column for is missing elsewhere.
  const columns = form.columns.filter(({ quantity }) =>
    cells.some((cell) => cell.quantity === quantity),
  );
  const toCorrect = wrong.length > 0 || sheet.notes.some(({ row }) => row !== undefined);
  return (
    <>
      {byBore && (
        <BoreMap
          layout={layout}
          view="mini"
          bores={boreStates(boreMarks(layout, { ...form, columns }, judged, []))}
          label={`${file.name} before it counts, front at the left`}
          onSelect={(position) => grid.current?.goTo(position)}
        />
      )}
      {form.per === 'degree' && (
        <LiftCurve readings={liftsOf(judged)} label={`${file.name} before it counts`} />
      )}
      <CellsToCorrect cells={wrong} onChange={onChange} />
      <ValuesGrid
        ref={grid}
        form={form}
        layout={layout}
        judged={judged}
        label={`${form.title}, as ${file.name} says`}
        onChange={onChange}
      />
      {toCorrect && (
        <p className="py-2">
          Put it right here, or in your own program:{' '}
          <a href={`/api/sheets/${file.fileId}/corrections`} download>
            {file.name} with a column that says what to correct
          </a>
          , then add that file.
        </p>
      )}
      {changes > 0 && (
        <p>
          <strong>{counted(changes, 'value', 'values')}</strong> in the form will be replaced by
          what this file says.
        </p>
      )}
      <p className="actions mt-3">
        <button type="button" className="btn" onClick={onConfirm}>
          Confirm these {counted(judged.length, 'value', 'values')}
        </button>
        <span className="min-w-0 flex-1 basis-48">
          {wrong.length === 0
            ? 'Nothing of this file counts until you confirm it.'
            : `${good} count once you confirm; ${counted(wrong.length, 'cell stays', 'cells stay')} to be corrected before you hand in.`}
        </span>
      </p>
    </>
  );
};
