import { type KeyboardEvent, type Ref, useId, useImperativeHandle, useRef, useState } from 'react';
import type { JudgedCell } from '@/domain/paperwork/sheet/judge-cells';
import { sheetRows } from '@/domain/paperwork/sheet/positions';
import {
  placeKey,
  retyped,
  type SheetCell,
  sourceWords,
} from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm, SheetRow } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { type GridColumn, gridColumns } from './grid-columns';
import { type GridPlace, keyStep, leavesCell } from './grid-keys';

export interface GridHandle {
  /** Goes to the first cell of a place that is to be corrected, or to its first. */
  readonly goTo: (position: string) => void;
}

interface ValuesGridProps {
  readonly form: SheetForm;
  readonly layout: BoreLayout;
  readonly judged: readonly JudgedCell[];
  readonly label: string;
  readonly onChange: (cell: SheetCell) => void;
  readonly ref?: Ref<GridHandle>;
}

/** Rows and cells of a table that is a grid are the grid’s (HTML AAM). */
const AS_GRID = { role: 'grid' } as const;

/** What heads the rows that are no bores. */
const ROWS: Partial<Record<SheetRow, string>> = { cylinder: 'Cylinder', degree: 'Degrees' };

const emptyAt = (position: string, { title: _title, ...column }: GridColumn): SheetCell => ({
  position,
  ...column,
  typed: '',
});

const wordsOf = (judged: JudgedCell | undefined): string => {
  const { cell, detail, remedy } = judged ?? {};
  const held = cell?.source?.held === undefined ? '' : `, which held “${cell.source.held}”`;
  const from = cell?.source === undefined ? '' : `From ${sourceWords(cell.source)}${held}.`;
  return [detail, remedy, from].filter((part) => part !== undefined && part !== '').join(' ');
};

/**
 * Every value of a sheet in a grid of real inputs (WAI-ARIA grid pattern): one stop for the tabulator,
 * arrow keys, Home and End between cells; typing, Enter or F2 edits, Escape takes it back.
 */
export const ValuesGrid = ({ form, layout, judged, label, onChange, ref }: ValuesGridProps) => {
  const id = useId();
  const table = useRef<HTMLTableElement>(null);
  const [active, setActive] = useState<GridPlace>({ row: 0, column: 0 });
  const editing = useRef(false);
  const before = useRef<SheetCell>(undefined);
  const columns = gridColumns(form, judged);
  const rows = sheetRows(
    form,
    layout,
    judged.map(({ cell }) => cell),
  );
  const byPlace = new Map(judged.map((one) => [placeKey(one.cell), one]));
  const size = { rows: rows.length, columns: columns.length };

  const at = ({ row, column }: GridPlace) => {
    const [place, kind] = [rows[row], columns[column]];
    if (place === undefined || kind === undefined) return undefined;
    const empty = emptyAt(place.key, kind);
    const found = byPlace.get(placeKey(empty));
    return { cell: found?.cell ?? empty, found };
  };
  const focus = ({ row, column }: GridPlace) =>
    table.current
      ?.querySelector<HTMLInputElement>(`input[data-row="${row}"][data-column="${column}"]`)
      ?.focus();

  useImperativeHandle(ref, () => ({
    goTo: (position) => {
      const row = rows.findIndex(({ key }) => key === position);
      const bad = columns.findIndex(
        (_, column) => (at({ row, column })?.found?.state ?? 'ok') !== 'ok',
      );
      focus({ row, column: Math.max(0, bad) });
    },
  }));

  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    const input = event.currentTarget;
    if (event.key === 'Escape' && editing.current && before.current !== undefined) {
      event.preventDefault();
      onChange(before.current);
      editing.current = false;
      requestAnimationFrame(() => input.select());
      return;
    }
    if (!editing.current && (event.key === 'F2' || event.key === 'Enter')) {
      event.preventDefault();
      editing.current = true;
      input.setSelectionRange(input.value.length, input.value.length);
      return;
    }
    if (editing.current && !leavesCell(event.key)) return;
    const key = event.key === 'Enter' ? 'ArrowDown' : event.key;
    const to = keyStep(active, { key, ctrlKey: event.ctrlKey }, size);
    if (to === undefined) return;
    event.preventDefault();
    editing.current = false;
    focus(to);
  };

  const input = (place: GridPlace, name: string) => {
    const { cell, found } = at(place) ?? {};
    if (cell === undefined) return null;
    const isActive = place.row === active.row && place.column === active.column;
    return (
      <input
        className="input input-num min-w-28"
        inputMode="decimal"
        autoComplete="off"
        maxLength={60}
        data-row={place.row}
        data-column={place.column}
        tabIndex={isActive ? 0 : -1}
        aria-label={name}
        aria-invalid={found?.state === 'faulty' ? true : undefined}
        aria-describedby={isActive ? `${id}-cell` : undefined}
        value={cell.typed}
        onKeyDown={onKeyDown}
        onFocus={(event) => {
          setActive(place);
          editing.current = false;
          before.current = cell;
          event.currentTarget.select();
        }}
        onPointerDown={(event) => {
          // A second tap sets the caret: from then on the arrows belong to the text.
          if (document.activeElement === event.currentTarget) editing.current = true;
        }}
        onChange={(event) => {
          editing.current = true;
          onChange(retyped(cell, event.target.value));
        }}
      />
    );
  };

  return (
    <>
      <section className="scroll-x" aria-label={`${label}: scrolls sideways`}>
        <table {...AS_GRID} ref={table} aria-label={label} aria-describedby={`${id}-keys`}>
          <thead>
            <tr>
              <th scope="col">{ROWS[form.per] ?? 'Bore'}</th>
              {columns.map((column) => (
                <th scope="col" key={column.title}>
                  {column.title} ({column.unit})
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((place, row) => (
              <tr key={place.key}>
                <th scope="row">{place.key}</th>
                {columns.map(({ title }, column) => {
                  const state = at({ row, column })?.found?.state ?? 'ok';
                  return (
                    <td key={title} className={state === 'ok' ? undefined : 'bg-tint-close'}>
                      {input({ row, column }, `${place.key}, ${title}`)}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      <p className="min-h-12" id={`${id}-cell`}>
        {wordsOf(at(active)?.found)}
      </p>
      <p className="hint" id={`${id}-keys`}>
        Arrow keys, Home and End move; typing or F2 edits; Escape takes it back.
      </p>
    </>
  );
};
