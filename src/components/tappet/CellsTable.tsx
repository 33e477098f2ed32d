import { displayNumber } from '../look/ReadingValue';

export interface Cell {
  readonly key: string;
  /** As written; absent while nothing is taken. */
  readonly value?: string | undefined;
  readonly state?: 'kept' | 'struck' | 'hidden';
}

export interface CellsTableProps {
  /** "6 of 6 taken". */
  readonly progress: string;
  /** Heads of the columns: Along, Across, Third axis. */
  readonly axes: readonly string[];
  readonly rows: readonly { readonly depth: string; readonly cells: readonly Cell[] }[];
  readonly current?: string | undefined;
  readonly onSelect?: ((key: string) => void) | undefined;
  /** Differences from zero carry their plus sign. */
  readonly signed?: boolean;
}

const shown = (cell: Cell, signed: boolean): string => {
  if (cell.state === 'hidden') return 'hidden';
  return cell.value === undefined ? '' : displayNumber(cell.value, signed);
};

/** The set of one bore: depths down, axes across. A tap on a cell goes there. */
export const CellsTable = ({
  progress,
  axes,
  rows,
  current,
  onSelect,
  signed = true,
}: CellsTableProps) => (
  <table className="cells">
    <colgroup>
      <col />
      {axes.map((axis) => (
        <col key={axis} />
      ))}
    </colgroup>
    <thead>
      <tr>
        <th scope="col">{progress}</th>
        {axes.map((axis) => (
          <th scope="col" className="num" key={axis}>
            {axis}
          </th>
        ))}
      </tr>
    </thead>
    <tbody>
      {rows.map((row) => (
        <tr key={row.depth}>
          <th scope="row">{row.depth}</th>
          {row.cells.map((cell, index) => {
            const text = shown(cell, signed);
            const isCurrent = cell.key === current;
            const struck = cell.state === 'struck' ? ' cell-struck' : '';
            const className = `cell${isCurrent ? ' cell-current' : ''}${struck}`;
            return (
              <td key={cell.key}>
                {onSelect === undefined ? (
                  <span className={className}>{text}</span>
                ) : (
                  <button
                    type="button"
                    className={className}
                    aria-current={isCurrent ? 'true' : undefined}
                    aria-label={`${row.depth}, ${axes[index] ?? ''}: ${text || 'empty'}${struck && ', struck'}`}
                    onClick={() => onSelect(cell.key)}
                  >
                    {text}
                  </button>
                )}
              </td>
            );
          })}
        </tr>
      ))}
    </tbody>
  </table>
);
