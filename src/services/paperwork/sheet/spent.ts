/** What reading one file has cost so far. A reader adds before it works, so that a bound stops it in time. */
export interface Spent {
  /** Bytes that packed parts unfolded to. */
  unpackedBytes: number;
  /** Tags of XML that were looked at. */
  tags: number;
  /** Rows that hold something. */
  rows: number;
  /** Cells that hold something. */
  cells: number;
}

export const nothingSpent = (): Spent => ({ unpackedBytes: 0, tags: 0, rows: 0, cells: 0 });

/** What one measurement sheet may cost; sixteen bores with every reading need a thousandth of it. */
export const MOST_SPENT: Spent = {
  unpackedBytes: 20_000_000,
  tags: 600_000,
  rows: 2_000,
  cells: 40_000,
};

export const MOST_ROWS = MOST_SPENT.rows;
export const MOST_COLUMNS = 100;
export const MOST_CELL = 2_000;
