import type { TextRows } from './sheet-grid';

/** Longer than any number with its unit. */
const LONGEST = 40;

const COMMA = /^[+\-−]?\d+,\d+(\s*\D*)?$/;
const POINT = /^[+\-−]?\d*\.\d+(\s*\D*)?$/;

/** Whether this sheet writes its decimals with a comma: some cell does, and none with a point. */
export const hasDecimalCommas = (rows: TextRows): boolean => {
  const cells = rows.flatMap((row) =>
    row.filter((cell) => cell.length <= LONGEST).map((cell) => cell.trim()),
  );
  return cells.some((cell) => COMMA.test(cell)) && !cells.some((cell) => POINT.test(cell));
};

const EITHER = /^[+\-−]?[1-9]\d{0,2},\d{3}(\s*\D*)?$/;

/** `21,387` alone could be two numbers; on such a sheet it is 21.387. Anything else stays as it was written. */
export const withPoint = (text: string): string =>
  text.length <= LONGEST && EITHER.test(text.trim()) ? text.replace(',', '.') : text;
