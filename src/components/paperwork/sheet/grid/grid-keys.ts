/** A cell of a grid, from 0. */
export interface GridPlace {
  readonly row: number;
  readonly column: number;
}

export interface GridSize {
  readonly rows: number;
  readonly columns: number;
}

const PAGE = 8;

const STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
  PageUp: [-PAGE, 0],
  PageDown: [PAGE, 0],
};

const within = (value: number, count: number): number => Math.max(0, Math.min(count - 1, value));

/**
 * Where a key leads from a cell while nothing is being edited (WAI-ARIA Authoring Practices, grid pattern);
 * nothing for any other key. At the edge it stays.
 */
export const keyStep = (
  from: GridPlace,
  { key, ctrlKey }: { readonly key: string; readonly ctrlKey: boolean },
  size: GridSize,
): GridPlace | undefined => {
  if (key === 'Home') return { row: ctrlKey ? 0 : from.row, column: 0 };
  if (key === 'End') return { row: ctrlKey ? size.rows - 1 : from.row, column: size.columns - 1 };
  const step = STEPS[key];
  if (step === undefined || ctrlKey) return undefined;
  return {
    row: within(from.row + step[0], size.rows),
    column: within(from.column + step[1], size.columns),
  };
};

/** Keys that end the editing of a cell and lead on; left and right belong to the text then. */
export const leavesCell = (key: string): boolean =>
  key === 'Enter' || key === 'ArrowUp' || key === 'ArrowDown';
