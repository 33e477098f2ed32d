import type { KeyboardEvent } from 'react';
import type { JudgedCell } from '@/domain/paperwork/sheet/judge-cells';
import { rowsFor } from '@/domain/paperwork/sheet/positions';
import { placeKey, type SheetCell } from '@/domain/paperwork/sheet/sheet-cell';
import type { SheetForm } from '@/domain/rulebook/form/form';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';

interface ValuesTableProps {
  readonly form: SheetForm;
  readonly layout: BoreLayout;
  readonly judged: readonly JudgedCell[];
  readonly onChange: (cell: SheetCell) => void;
}

interface Column {
  readonly quantity: SheetCell['quantity'];
  readonly depth: string;
  readonly axis: string;
  readonly unit: string;
  readonly title: string;
}

/** A column for every quantity the rules want, and for each depth, axis or repeat that somebody wrote. */
const columnsOf = (form: SheetForm, judged: readonly JudgedCell[]): readonly Column[] =>
  form.columns.flatMap(({ quantity, label, unit }) => {
    const own = judged.filter(({ cell }) => cell.quantity === quantity);
    const kinds = new Map(own.map(({ cell }) => [`${cell.depth}|${cell.axis}`, cell]));
    const cells =
      kinds.size === 0 ? [{ quantity, depth: '', axis: '', unit }] : [...kinds.values()];
    return cells.map((cell) => {
      const place = [cell.depth, cell.axis].filter((part) => part !== '').join(' ');
      const title = [label, place].filter((part) => part !== '').join(', ');
      return { quantity, depth: cell.depth, axis: cell.axis, unit: cell.unit, title };
    });
  });

const STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowDown: [1, 0],
  ArrowUp: [-1, 0],
  Enter: [1, 0],
};

/** Down and up through a column; left and right belong to the text in the field. */
const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
  const step = STEPS[event.key];
  if (step === undefined) return;
  event.preventDefault();
  const { row = '0', column = '0' } = event.currentTarget.dataset;
  const selector = `input[data-row="${Number(row) + step[0]}"][data-column="${column}"]`;
  event.currentTarget.closest('table')?.querySelector<HTMLInputElement>(selector)?.focus();
};

/** Every value of the sheet in a grid of real inputs. */
export const ValuesTable = ({ form, layout, judged, onChange }: ValuesTableProps) => {
  const columns = columnsOf(form, judged);
  const byPlace = new Map(judged.map((one) => [placeKey(one.cell), one]));
  return (
    <div className="scroll-x">
      <table aria-label={form.title}>
        <thead>
          <tr>
            <th scope="col">{form.per === 'cylinder' ? 'Cylinder' : 'Bore'}</th>
            {columns.map((column) => (
              <th scope="col" key={column.title}>
                {column.title} ({column.unit})
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rowsFor(form.per, layout).map((place, row) => (
            <tr key={place.key}>
              <th scope="row">{place.key}</th>
              {columns.map(({ title, ...column }, at) => {
                const { quantity, depth, axis, unit } = column;
                const empty = { position: place.key, quantity, depth, axis, typed: '', unit };
                const found = byPlace.get(placeKey(empty));
                const state = found?.state ?? 'ok';
                return (
                  <td key={title} className={state === 'ok' ? undefined : 'bg-tint-close'}>
                    <input
                      className="input input-num min-w-28"
                      inputMode="decimal"
                      autoComplete="off"
                      maxLength={60}
                      data-row={row}
                      data-column={at}
                      aria-label={`${place.key}, ${title}`}
                      aria-invalid={state === 'faulty' ? true : undefined}
                      value={found?.cell.typed ?? ''}
                      onKeyDown={onKeyDown}
                      onChange={(event) =>
                        onChange({
                          ...(found?.cell ?? empty),
                          typed: event.target.value,
                          source: undefined,
                          confirmed: undefined,
                        })
                      }
                    />
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
};
